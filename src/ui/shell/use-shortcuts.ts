// Owns the keys that work everywhere in the bench.
// Must not know the places that have keys of their own.
import { useEffect } from 'react';
import { openJobFile, saveJobFile } from '../../app/files.ts';
import { useJobStore } from '../../app/job-store.ts';
import { useDialogStore } from './dialog-store.ts';

type Shortcut = 'undo' | 'redo' | 'find' | 'open' | 'save';

/** Which shortcut a key press is, if any. Letters by their meaning, so that other keyboards keep their own places. */
export function readShortcut(press: Pick<KeyboardEvent, 'key' | 'ctrlKey' | 'metaKey' | 'shiftKey' | 'altKey'>): Shortcut | null {
  if (!(press.ctrlKey || press.metaKey) || press.altKey) return null;
  switch (press.key.toLowerCase()) {
    case 'z':
      return press.shiftKey ? 'redo' : 'undo';
    case 'y':
      return press.shiftKey ? null : 'redo';
    case 'k':
      return 'find';
    case 'o':
      return 'open';
    case 's':
      return 'save';
    default:
      return null;
  }
}

/** While a text is being written, undo belongs to the text. */
function isWriting(target: EventTarget | null): boolean {
  return target instanceof HTMLElement && target.matches('input:not([type=checkbox]):not([type=radio]), textarea');
}

function obey(shortcut: Shortcut): void {
  switch (shortcut) {
    case 'undo':
      return useJobStore.getState().undo();
    case 'redo':
      return useJobStore.getState().redo();
    case 'find':
      return useDialogStore.getState().show('commands');
    case 'open':
      return void openJobFile();
    case 'save':
      return void saveJobFile();
  }
}

export function useShortcuts(): void {
  useEffect(() => {
    const listen = (event: KeyboardEvent): void => {
      const shortcut = readShortcut(event);
      if (shortcut === null || event.defaultPrevented) return;
      if ((shortcut === 'undo' || shortcut === 'redo') && isWriting(event.target)) return;
      event.preventDefault();
      obey(shortcut);
    };
    addEventListener('keydown', listen);
    return () => removeEventListener('keydown', listen);
  }, []);
}
