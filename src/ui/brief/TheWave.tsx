// Owns the sentences on the wave: what the section stands for, the band, the drives.
// Must not know how fields are computed.
import { useJobStore } from '../../app/job-store.ts';
import { useViewStore } from '../../app/view-store.ts';
import type { Section } from '../../model/job.ts';
import { accountForSection } from '../../model/describe-section.ts';
import { useShallow } from 'zustand/react/shallow';
import { addDrive } from './additions.ts';
import { AddLink, AddLinks } from './AddLinks.tsx';
import { Choice } from './Choice.tsx';
import { DriveLine } from './DriveLine.tsx';
import { setValue, tryCommand } from './editing.ts';
import { SaidHere } from './SaidHere.tsx';
import { Action } from './ThingLine.tsx';
import { NumberValue, QuantityValue } from './values.tsx';

export function TheWave() {
  const drives = useJobStore((state) => state.job.drives);
  const setTool = useViewStore((state) => state.setTool);
  return (
    <section aria-labelledby="brief-wave">
      <h2 className="heading" id="brief-wave">
        The wave
      </h2>
      <SectionWords />
      <BandWords />
      <SaidHere place="wave" />
      {drives.map((drive, index) => (
        <DriveLine key={drive.id} drive={drive} index={index} />
      ))}
      <AddLinks>
        <AddLink label="plane wave" onAdd={() => addDrive('plane wave')} />
        <AddLink
          label="line current"
          onDraw={() => setTool({ kind: 'place', thing: 'line current' })}
          onAdd={() => addDrive('line current')}
        />
      </AddLinks>
    </section>
  );
}

const OUT_OF_PLANE: readonly (readonly [Section, string])[] = [
  ['E out of plane', 'E'],
  ['H out of plane', 'H'],
];

function SectionWords() {
  const section = useJobStore((state) => state.job.section);
  const account = useJobStore(useShallow((state) => accountForSection(state.job)));
  const turn = (to: Section): void => {
    if (to !== section) tryCommand({ do: 'set section', section: to });
  };
  const along = section === 'E out of plane';
  return (
    <>
      <p>
        <Choice label="Field out of the plane" value={section} options={OUT_OF_PLANE} onChoose={turn} /> points out of the plane.{' '}
        {account.standsFor}
      </p>
      <fieldset className="question">
        <legend>Does E lie along the slot or across it?</legend>
        <span className="group">
          <button type="button" className="plain-button" aria-pressed={along} onClick={() => turn('E out of plane')}>
            along
          </button>
          <button type="button" className="plain-button" aria-pressed={!along} onClick={() => turn('H out of plane')}>
            across
          </button>
        </span>
      </fieldset>
      <p>
        {account.slots} <span className="soft">{account.exactFor}</span>
      </p>
    </>
  );
}

function BandWords() {
  const band = useJobStore((state) => state.job.band);
  return (
    <p>
      The band runs from{' '}
      <QuantityValue path={['band', 'from']} text={band.from} label="Start of the band" dimension="frequency" /> to{' '}
      <QuantityValue path={['band', 'to']} text={band.to} label="End of the band" dimension="frequency" />, read at{' '}
      <NumberValue path={['band', 'points']} value={band.points} label="Number of frequencies" whole /> frequencies
      {band.listed.length === 0 ? '. ' : ' and at '}
      {band.listed.map((text, index) => (
        // Frequencies have no ids and no state of their own: their place in the list is all they are.
        // oxlint-disable-next-line react/no-array-index-key
        <span key={index} className="listed">
          {index === 0 ? '' : ', '}
          <QuantityValue
            path={['band', 'listed', index]}
            text={text}
            label={`Spot frequency ${index + 1}`}
            dimension="frequency"
          />
          <Action
            label={`Remove spot frequency ${text}`}
            words="×"
            onAct={() => void setValue(['band', 'listed'], band.listed.toSpliced(index, 1))}
          />
        </span>
      ))}
      {band.listed.length === 0 ? '' : '. '}
      <button type="button" className="add-link" onClick={() => void setValue(['band', 'listed'], [...band.listed, band.to])}>
        + spot frequency
      </button>
    </p>
  );
}
