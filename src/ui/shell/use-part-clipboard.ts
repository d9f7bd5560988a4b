// Owns copying selected parts as rows of a spreadsheet, and pasting such rows as parts.
// Must not know how rows are read or written.
import { useEffect } from 'react';
import { useJobStore } from '../../app/job-store.ts';
import { tell, tellTrouble } from '../../app/notice-store.ts';
import { useViewStore } from '../../app/view-store.ts';
import { isPartsTable, readPartsTable, writePartsTable } from '../../model/parts-table.ts';

/** Where a person edits text, copying and pasting are about that text. */
function isText(target: EventTarget | null): boolean {
  return target instanceof HTMLElement && target.closest('input, textarea, [contenteditable="true"]') !== null;
}

function paste(event: ClipboardEvent): void {
  const text = event.clipboardData?.getData('text/plain') ?? '';
  if (isText(event.target) || !isPartsTable(text)) return;
  event.preventDefault();
  const { job, dispatch } = useJobStore.getState();
  const read = readPartsTable(text, job, useViewStore.getState().paint);
  if (!read.ok) return tellTrouble('The rows could not be made into parts.', read.errors);
  const done = dispatch({ do: 'set', path: ['parts'], value: [...job.parts, ...read.value] });
  if (!done.ok) return tellTrouble('The rows could not be made into parts.', done.errors);
  useViewStore.getState().select(read.value.map((part) => part.id));
  const words = read.value.length === 1 ? 'One part is pasted.' : `${read.value.length} parts are pasted.`;
  tell(words, { label: 'Undo', run: () => useJobStore.getState().undo() });
}

function copy(event: ClipboardEvent): void {
  if (isText(event.target) || getSelection()?.isCollapsed === false) return;
  const chosen = new Set(useViewStore.getState().selection);
  const parts = useJobStore.getState().job.parts.filter((part) => chosen.has(part.id));
  if (parts.length === 0) return;
  event.clipboardData?.setData('text/plain', writePartsTable(parts));
  event.preventDefault();
}

export function usePartClipboard(): void {
  useEffect(() => {
    document.addEventListener('paste', paste);
    document.addEventListener('copy', copy);
    return () => {
      document.removeEventListener('paste', paste);
      document.removeEventListener('copy', copy);
    };
  }, []);
}
