// Owns the notes of the job, written as they come.
// Must not know the rest of the job.
import { useRef } from 'react';
import { useJobStore } from '../../app/job-store.ts';
import { setValue } from './editing.ts';

let visits = 0;

export function Notes() {
  const notes = useJobStore((state) => state.job.notes);
  const visit = useRef('notes');
  return (
    <section aria-labelledby="brief-notes">
      <h2 className="heading" id="brief-notes">
        Notes
      </h2>
      <textarea
        className="notes"
        aria-labelledby="brief-notes"
        placeholder="What this job is about, and what was decided."
        value={notes}
        rows={Math.min(14, Math.max(2, notes.split('\n').length + Math.floor(notes.length / 48)))}
        onFocus={() => (visit.current = `notes ${(visits += 1)}`)}
        // All that is written in one visit is one step back.
        onChange={(event) => void setValue(['notes'], event.target.value, visit.current)}
      />
    </section>
  );
}
