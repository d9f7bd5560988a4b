// Owns the sentences on probes and on the reference run.
// Must not know how readings are made.
import { useJobStore } from '../../app/job-store.ts';
import { useViewStore } from '../../app/view-store.ts';
import type { Job, Probe } from '../../model/job.ts';
import { addProbe, duplicate, remove } from './additions.ts';
import { AddLink, AddLinks } from './AddLinks.tsx';
import { Choice } from './Choice.tsx';
import { setValue } from './editing.ts';
import { SaidHere } from './SaidHere.tsx';
import { Action, ThingLine } from './ThingLine.tsx';
import { NameValue, PointValue } from './values.tsx';

const REFERENCE_WORDS: readonly (readonly [Job['reference'], string])[] = [
  ['without marked parts', 'without the parts left out of it'],
  ['empty sheet', 'on the empty sheet'],
  ['none', 'not at all'],
];

export function WhereWeRead() {
  const probes = useJobStore((state) => state.job.probes);
  const reference = useJobStore((state) => state.job.reference);
  const placing = useViewStore((state) => state.tool.kind === 'place' && state.tool.thing === 'probe');
  const setTool = useViewStore((state) => state.setTool);
  return (
    <section aria-labelledby="brief-read">
      <h2 className="heading" id="brief-read">
        Where we read
      </h2>
      {probes.map((probe, index) => (
        <ProbeLine key={probe.id} probe={probe} index={index} />
      ))}
      <AddLinks>
        <AddLink
          label="probe"
          pressed={placing}
          onDraw={() => setTool(placing ? { kind: 'select' } : { kind: 'place', thing: 'probe' })}
          onAdd={addProbe}
        />
      </AddLinks>
      <p>
        The reference run is made{' '}
        <Choice
          label="Reference run"
          value={reference}
          options={REFERENCE_WORDS}
          after="."
          onChoose={(chosen) => void setValue(['reference'], chosen)}
        />{' '}
        {reference === 'none' ? null : (
          <span className="soft">The insertion ratio is the field at a probe over the same in the reference run.</span>
        )}
      </p>
      <SaidHere place="read" />
    </section>
  );
}

function ProbeLine({ probe, index }: { readonly probe: Probe; readonly index: number }) {
  const { id, name, at } = probe;
  return (
    <ThingLine
      id={id}
      name={name}
      actions={
        <>
          <Action label={`Duplicate ${name}`} words="duplicate" onAct={() => duplicate([id])} />
          <Action label={`Remove ${name}`} words="remove" onAct={() => remove([id], name)} />
        </>
      }
    >
      <NameValue path={['probes', index, 'name']} text={name} label="Name of the probe" /> stands at{' '}
      <PointValue path={['probes', index, 'at']} point={at} label={name} />.
    </ThingLine>
  );
}
