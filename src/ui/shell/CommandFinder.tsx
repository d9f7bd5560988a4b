// Owns the dialog in which any command is found by a few letters.
// Must not know what the commands do.
import { Command } from 'cmdk';
import { Dialog } from 'radix-ui';
import { useMemo } from 'react';
import type { Example } from '../../app/examples.ts';
import { useViewStore } from '../../app/view-store.ts';
import { listCommands } from './commands.ts';
import type { BenchCommand } from './commands.ts';
import { useDialogStore } from './dialog-store.ts';

/** Every word typed must begin a word of the command, in our words (better) or in others. */
export function rankCommand(label: string, search: string, also: readonly string[] = []): number {
  const begins = (text: string, word: string): boolean =>
    text
      .toLowerCase()
      .split(/[^\p{L}\p{N}|=]+/u)
      .some((part) => part.startsWith(word));
  const words = search
    .toLowerCase()
    .split(/\s+/)
    .filter((word) => word !== '');
  if (words.every((word) => begins(label, word))) return 1;
  const everything = [label, ...also].join(' ');
  return words.every((word) => begins(everything, word)) ? 0.5 : 0;
}

const GROUPS = ['Run', 'Draw', 'Look', 'Job', 'Help'] as const;

export function CommandFinder({ examples }: { readonly examples: readonly Example[] }) {
  const open = useDialogStore((state) => state.open === 'commands');
  const close = useDialogStore((state) => state.close);
  return (
    <Dialog.Root open={open} onOpenChange={(on) => !on && close()}>
      <Dialog.Portal>
        <Dialog.Overlay className="dialog-shade" />
        <Dialog.Content
          className="finder"
          aria-describedby={undefined}
          // A tool chosen here has its keys on the sheet.
          onCloseAutoFocus={(event) => useViewStore.getState().tool.kind !== 'select' && event.preventDefault()}
        >
          <Dialog.Title className="hidden-visually">Find a command</Dialog.Title>
          <FinderList examples={examples} onDone={close} />
        </Dialog.Content>
      </Dialog.Portal>
    </Dialog.Root>
  );
}

function FinderList({ examples, onDone }: { readonly examples: readonly Example[]; onDone(): void }) {
  const commands = useMemo(() => listCommands(examples), [examples]);
  const choose = (command: BenchCommand): void => {
    onDone();
    command.run();
  };
  return (
    <Command label="Find a command" loop filter={rankCommand}>
      <Command.Input placeholder="What shall be done?" />
      <Command.List>
        <Command.Empty>No command is called that. Try another word for it.</Command.Empty>
        {GROUPS.map((group) => (
          <Command.Group key={group} heading={group}>
            {commands
              .filter((command) => command.group === group)
              .map((command) => (
                <Command.Item
                  key={command.label}
                  value={command.label}
                  keywords={[...command.also]}
                  onSelect={() => choose(command)}
                >
                  <span>{command.label}</span>
                  {command.keys === undefined ? null : <kbd>{command.keys}</kbd>}
                </Command.Item>
              ))}
          </Command.Group>
        ))}
      </Command.List>
    </Command>
  );
}
