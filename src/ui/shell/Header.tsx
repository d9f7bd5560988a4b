// Owns the line at the top: whose bench, which job, whether it is saved, and the few things done to a whole job.
// Must not know how files are read or written.
import { DropdownMenu } from 'radix-ui';
import { createContext, use, useState } from 'react';
import type { ReactNode } from 'react';
import type { Example } from '../../app/examples.ts';
import {
  exportSheetPicture,
  exportSpectrum,
  exportTimeSeries,
  openExample,
  openJobFile,
  saveJobFile,
  startNewJob,
} from '../../app/files.ts';
import { useJobStore } from '../../app/job-store.ts';
import { useRunStore } from '../../app/run-store.ts';
import { useViewStore } from '../../app/view-store.ts';
import { useDialogStore } from './dialog-store.ts';
import { JobTitle } from './JobTitle.tsx';

/** Menus open inside the header, so that they belong to its landmark. */
const MenuPlace = createContext<HTMLElement | null>(null);

export function Header({ examples }: { readonly examples: readonly Example[] }) {
  const show = useDialogStore((state) => state.show);
  const [header, setHeader] = useState<HTMLElement | null>(null);
  return (
    <header className="header" ref={setHeader}>
      <MenuPlace value={header}>
        <h1 className="wordmark">Guidewall</h1>
        <JobTitle />
        <SavedState />
        <span className="header-gap" />
        <UndoRedo />
        <button type="button" className="header-item" onClick={() => show('commands')}>
          <span className="header-long">find a command</span> <kbd>Ctrl K</kbd>
        </button>
        <button type="button" className="header-item" onClick={() => void openJobFile()}>
          open
        </button>
        <Menu label="examples">
          {examples.map((example) => (
            <DropdownMenu.Item key={example.id} className="menu-item" onSelect={() => void openExample(example)}>
              {example.title}
              <span className="menu-note">{example.lookAt}</span>
            </DropdownMenu.Item>
          ))}
          <DropdownMenu.Separator className="menu-line" />
          <MenuItem label="An empty job" onSelect={startNewJob} />
        </Menu>
        <ExportMenu />
        <ThemeSwitch />
        <button type="button" className="header-item" onClick={() => show('cautions')}>
          limits
        </button>
      </MenuPlace>
    </header>
  );
}

function SavedState() {
  const saved = useJobStore((state) => state.saved);
  return (
    <output className="soft saved-state" data-state={saved}>
      {saved}
    </output>
  );
}

function UndoRedo() {
  const undo = useJobStore((state) => state.undo);
  const redo = useJobStore((state) => state.redo);
  const undoLabel = useJobStore((state) => state.undoLabel);
  const redoLabel = useJobStore((state) => state.redoLabel);
  return (
    <>
      <button
        type="button"
        className="header-item"
        disabled={undoLabel === null}
        title={undoLabel === null ? 'Nothing to undo' : `Undo: ${undoLabel}`}
        onClick={undo}
      >
        undo <kbd>Ctrl Z</kbd>
      </button>
      <button
        type="button"
        className="header-item"
        disabled={redoLabel === null}
        title={redoLabel === null ? 'Nothing to redo' : `Redo: ${redoLabel} (Ctrl Shift Z)`}
        onClick={redo}
      >
        redo
      </button>
    </>
  );
}

function Menu({ label, children }: { readonly label: string; readonly children: ReactNode }) {
  return (
    <DropdownMenu.Root modal={false}>
      <DropdownMenu.Trigger className="header-item">{label}</DropdownMenu.Trigger>
      <DropdownMenu.Portal container={use(MenuPlace)}>
        <DropdownMenu.Content className="menu" align="end" sideOffset={6} collisionPadding={8}>
          {children}
        </DropdownMenu.Content>
      </DropdownMenu.Portal>
    </DropdownMenu.Root>
  );
}

function MenuItem(props: { readonly label: string; readonly note?: string; readonly disabled?: boolean; onSelect(): void }) {
  return (
    <DropdownMenu.Item className="menu-item" disabled={props.disabled ?? false} onSelect={props.onSelect}>
      {props.label}
      {props.note === undefined ? null : <span className="menu-note">{props.note}</span>}
    </DropdownMenu.Item>
  );
}

function ExportMenu() {
  const nothing = useRunStore((state) => state.main === null);
  return (
    <Menu label="export">
      <MenuItem
        label="Time series (CSV)"
        note="every sample of every probe, SI units"
        disabled={nothing}
        onSelect={exportTimeSeries}
      />
      <MenuItem
        label="Spectrum (CSV)"
        note="real and imaginary part, the reference run and H"
        disabled={nothing}
        onSelect={() => void exportSpectrum()}
      />
      <MenuItem label="The sheet (PNG)" note="as it stands, with the field" onSelect={() => void exportSheetPicture()} />
      <DropdownMenu.Separator className="menu-line" />
      <MenuItem label="The job as a file" note="opens here and in the command line" onSelect={() => void saveJobFile()} />
    </Menu>
  );
}

function ThemeSwitch() {
  const theme = useViewStore((state) => state.theme);
  const setTheme = useViewStore((state) => state.setTheme);
  const other = theme === 'light' ? 'dark' : 'light';
  return (
    <button type="button" className="header-item" aria-label={`Turn to ${other}`} onClick={() => setTheme(other)}>
      {other}
    </button>
  );
}
