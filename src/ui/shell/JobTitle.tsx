// Owns the title of the job, editable where it stands.
// Must not know the rest of the header.
import { useState } from 'react';
import { useJobStore } from '../../app/job-store.ts';

export function JobTitle() {
  const title = useJobStore((state) => state.job.title);
  const [draft, setDraft] = useState<string | null>(null);
  const commit = (): void => {
    if (draft !== null && draft.trim() !== title) {
      useJobStore.getState().dispatch({ do: 'set', path: ['title'], value: draft.trim() });
    }
    setDraft(null);
  };
  const shown = draft ?? title;
  return (
    <input
      className="job-title"
      aria-label="Title of the job"
      value={shown}
      placeholder="Untitled"
      maxLength={200}
      size={Math.max(8, Math.min(60, shown.length + 1))}
      spellCheck={false}
      onChange={(event) => setDraft(event.target.value)}
      onBlur={commit}
      onKeyDown={(event) => {
        if (event.key === 'Enter') event.currentTarget.blur();
        if (event.key === 'Escape') setDraft(null);
      }}
    />
  );
}
