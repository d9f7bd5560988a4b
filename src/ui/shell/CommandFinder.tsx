// Owns the dialog in which any command is found by a few letters.
// Must not know what the commands do.
import { Command } from 'cmdk';
import { Dialog } from 'radix-ui';
import { useMemo } from 'react';
import type { Example } from '../../app/examples.ts';
import { listCommands } from './commands.ts';
import type { BenchCommand } from './commands.ts';
import { useDialogStore } from './dialog-store.ts';

const GROUPS = ['Run', 'Draw', 'Look', 'Job', 'Help'] as const;

export function CommandFinder({ examples }: { readonly examples: readonly Example[] }) {
  const open = useDialogStore((state) => state.open === 'commands');
  const close = useDialogStore((state) => state.close);
  return (
    <Dialog.Root open={open} onOpenChange={(on) => !on && close()}>
      <Dialog.Portal>
        <Dialog.Overlay className="dialog-shade" />
        <Dialog.Content className="finder" aria-describedby={undefined}>
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
    <Command label="Find a command" loop>
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
