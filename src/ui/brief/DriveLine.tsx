// Owns the sentence of one drive.
// Must not know how drives are launched.
import { parseQuantity } from '../../base/quantity.ts';
import type { Drive, Waveform } from '../../model/job.ts';
import { openSamples } from '../../app/files.ts';
import { useJobStore } from '../../app/job-store.ts';
import { useRunStore } from '../../app/run-store.ts';
import { duplicate, remove } from './additions.ts';
import { Choice } from './Choice.tsx';
import { setValue } from './editing.ts';
import type { Path } from './path-text.ts';
import { Action, ThingLine } from './ThingLine.tsx';
import { NameValue, PointValue, QuantityValue } from './values.tsx';
import { describeTravel, makeWaveform, WAVEFORM_WORDS } from './waveforms.ts';

export function DriveLine({ drive, index }: { readonly drive: Drive; readonly index: number }) {
  const { id, name } = drive;
  const path: Path = ['drives', index];
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
      <NameValue path={[...path, 'name']} text={name} label="Name of the drive" />
      {drive.kind === 'plane wave' ? (
        <PlaneWaveWords drive={drive} path={path} />
      ) : (
        <LineCurrentWords drive={drive} path={path} />
      )}
      <WaveformWords waveform={drive.waveform} path={[...path, 'waveform']} name={name} />
      {drive.kind === 'plane wave' ? <LaunchWords /> : null}
    </ThingLine>
  );
}

function PlaneWaveWords({ drive, path }: { readonly drive: Extract<Drive, { kind: 'plane wave' }>; readonly path: Path }) {
  const values = useJobStore((state) => state.job.values);
  const angle = parseQuantity(drive.angle, 'angle', values);
  const travel = angle.ok ? describeTravel(angle.value) : '';
  return (
    <>
      {' is a plane wave of '}
      <QuantityValue path={[...path, 'amplitude']} text={drive.amplitude} label="Peak electric field" dimension="field" />
      {` peak that comes ${travel === '' ? 'in' : travel}, towards `}
      <QuantityValue path={[...path, 'angle']} text={drive.angle} label="Direction of travel" dimension="angle" />
      {', as a '}
    </>
  );
}

function LineCurrentWords({ drive, path }: { readonly drive: Extract<Drive, { kind: 'line current' }>; readonly path: Path }) {
  const magnetic = useJobStore((state) => state.job.section === 'H out of plane');
  return (
    <>
      {magnetic ? ' is a magnetic line current of ' : ' is a line current of '}
      <QuantityValue
        path={[...path, 'amplitude']}
        text={drive.amplitude}
        label="Peak current"
        dimension={magnetic ? 'voltage' : 'current'}
      />
      {' peak at '}
      <PointValue path={[...path, 'at']} point={drive.at} label="Place of the line current" />
      {', with a '}
    </>
  );
}

function LaunchWords() {
  const launch = useRunStore((state) => state.estimate?.launch ?? null);
  return launch === null ? null : <span className="soft"> It is launched {launch}.</span>;
}

async function loadSamples(path: Path): Promise<void> {
  const loaded = await openSamples();
  if (loaded === null) return;
  const { times, values } = loaded.samples;
  setValue(path, { kind: 'samples', name: loaded.name, times, values });
}

function chooseKind(path: Path, kind: Waveform['kind']): void {
  const { resolved } = useJobStore.getState();
  const band = resolved.ok ? resolved.value.band : { fromHertz: 1e9, toHertz: 6e9 };
  if (kind === 'samples') void loadSamples(path);
  else setValue(path, makeWaveform(kind, band));
}

const AFTER_WAVEFORM: Readonly<Record<Waveform['kind'], string>> = {
  'band pulse': '.',
  'continuous wave': '',
  'damped step': '',
  samples: ',',
};

function WaveformWords({ waveform, path, name }: { readonly waveform: Waveform; readonly path: Path; readonly name: string }) {
  return (
    <>
      <Choice
        label={`Waveform of ${name}`}
        value={waveform.kind}
        options={WAVEFORM_WORDS}
        after={AFTER_WAVEFORM[waveform.kind]}
        onChoose={(kind) => chooseKind(path, kind)}
      />
      {waveform.kind === 'continuous wave' ? (
        <>
          {' at '}
          <QuantityValue path={[...path, 'frequency']} text={waveform.frequency} label="Frequency" dimension="frequency" />.
        </>
      ) : null}
      {waveform.kind === 'damped step' ? (
        <>
          {' that rises in '}
          <QuantityValue path={[...path, 'rise']} text={waveform.rise} label="Rise time" dimension="time" />
          {' and decays in '}
          <QuantityValue path={[...path, 'decay']} text={waveform.decay} label="Decay time" dimension="time" />.
        </>
      ) : null}
      {waveform.kind === 'samples' ? (
        <>
          {' '}
          <strong>{waveform.name}</strong>
          {`, ${waveform.times.length} of them. `}
          <Action label={`Load other samples for ${name}`} words="load others" onAct={() => void loadSamples(path)} />
        </>
      ) : null}
    </>
  );
}
