// Owns making new things: the empty job, parts, drives, probes, and their ids and names.
// Must not know stores or how things are drawn with the pointer.
import { chooseFreeId, chooseFreeName, defaultCurrentAmplitude } from './complete-job.ts';
import type { Drive, Job, Part, PartKind, Point, Probe } from './job.ts';

function takenIds(job: Job): ReadonlySet<string> {
  return new Set([...job.parts, ...job.drives, ...job.probes, ...job.materials].map((thing) => thing.id));
}

function takenNames(job: Job): ReadonlySet<string> {
  return new Set([...job.parts, ...job.drives, ...job.probes, ...job.materials].map((thing) => thing.name));
}

/** "wall-3": the prefix and the least number that no thing of the job has. */
export function newId(job: Job, prefix: string): string {
  return chooseFreeId(takenIds(job), prefix.replaceAll(' ', '-'));
}

/** "Wall B", "Probe 2": the first that is free. Parts are lettered, the rest numbered. */
export function newName(job: Job, label: string, lettered: boolean): string {
  return chooseFreeName(takenNames(job), label, lettered);
}

/** A sheet that can be run as soon as a part stands on it: 180 mm by 90 mm, 1 to 6 GHz, a plane wave along x. */
export function makeEmptyJob(): Job {
  return {
    guidewall: 1,
    title: 'Untitled',
    notes: '',
    section: 'E out of plane',
    band: { from: '1 GHz', to: '6 GHz', points: 201, listed: [] },
    sheet: {
      width: '180 mm',
      height: '90 mm',
      origin: ['0 mm', '0 mm'],
      background: 'air',
      edges: { left: 'absorbing', right: 'absorbing', bottom: 'absorbing', top: 'absorbing' },
    },
    grid: { cells: { perWavelength: 20 }, absorberCells: 12, courant: 0.99 },
    values: {},
    materials: [],
    parts: [],
    drives: [
      {
        id: 'plane-wave-1',
        name: 'Plane wave 1',
        kind: 'plane wave',
        amplitude: '1 V/m',
        angle: '0 deg',
        waveform: { kind: 'band pulse' },
      },
    ],
    probes: [],
    reference: 'without marked parts',
    stop: { decay: '60 dB', after: '100 ns' },
  };
}

/** What must be said of a part besides its id, name, material and mark. */
type Geometry<K extends PartKind> = Omit<Extract<Part, { kind: K }>, 'id' | 'name' | 'kind' | 'material' | 'leftOutOfReference'>;

/**
 * A part with a free id and name. It is left out of the reference run, since what a person draws on an empty sheet is
 * usually the thing whose effect is asked for.
 */
export function makePart<K extends PartKind>(
  job: Job,
  kind: K,
  material: string,
  geometry: Geometry<K>,
): Extract<Part, { kind: K }> {
  const base = { id: newId(job, kind), name: newName(job, kind, true), kind, material, leftOutOfReference: true };
  // The checker cannot see that Omit and this base make up the kind's type again.
  return { ...base, ...geometry } as unknown as Extract<Part, { kind: K }>;
}

export function makeProbe(job: Job, at: Point): Probe {
  return { id: newId(job, 'probe'), name: newName(job, 'probe', false), at };
}

export function makePlaneWave(job: Job, angle = '0 deg'): Drive {
  const waveform = { kind: 'band pulse' } as const;
  return {
    id: newId(job, 'plane-wave'),
    name: newName(job, 'plane wave', false),
    kind: 'plane wave',
    amplitude: '1 V/m',
    angle,
    waveform,
  };
}

export function makeLineCurrent(job: Job, at: Point): Drive {
  return {
    id: newId(job, 'line-current'),
    name: newName(job, 'line current', false),
    kind: 'line current',
    at,
    amplitude: defaultCurrentAmplitude(job.section),
    waveform: { kind: 'band pulse' },
  };
}
