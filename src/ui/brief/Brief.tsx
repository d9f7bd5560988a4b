// Owns the Brief: the job read as a specification, every value editable where it stands.
// Must not know how any sentence is made.
import { useMemo } from 'react';
import { useJobStore } from '../../app/job-store.ts';
import { useRunStore } from '../../app/run-store.ts';
import './brief.css';
import { NamedValues } from './NamedValues.tsx';
import { Notes } from './Notes.tsx';
import { gatherSaid } from './remarks.ts';
import { SaidContext } from './SaidHere.tsx';
import { TheParts } from './TheParts.tsx';
import { TheSheet } from './TheSheet.tsx';
import { TheWave } from './TheWave.tsx';
import { WhenItStops } from './WhenItStops.tsx';
import { WhereWeRead } from './WhereWeRead.tsx';

export function Brief() {
  const job = useJobStore((state) => state.job);
  const remarks = useRunStore((state) => state.estimate?.remarks);
  const errors = useRunStore((state) => state.errors);
  const said = useMemo(() => gatherSaid(job, remarks ?? [], errors), [job, remarks, errors]);
  return (
    <SaidContext value={said}>
      <aside className="brief" aria-label="Brief">
        <TheWave />
        <TheSheet />
        <TheParts />
        <WhereWeRead />
        <NamedValues />
        <WhenItStops />
        <Notes />
      </aside>
    </SaidContext>
  );
}
