// Owns what a short, hand-written job may leave out: ids, names, amplitudes, the time limit. Fills them once, on loading.
// Must not know how jobs are validated or stored.
import { C0 } from '../base/constants.ts';
import { formatQuantity, makeQuantityReader } from '../base/quantity.ts';
import type { Drive, Job, OwnMaterial, Part, Probe, Section } from './job.ts';
import type { DraftJob } from './job-schema.ts';

type Loose<T> = T extends unknown ? { readonly [K in keyof T]: T[K] } : never;
type DraftPart = Loose<DraftJob['parts'][number]>;
type DraftDrive = Loose<DraftJob['drives'][number]>;

/** "wall 2", "probe 1": the prefix and the least number that is free. */
export function chooseFreeId(taken: ReadonlySet<string>, prefix: string): string {
  let number = 1;
  while (taken.has(`${prefix}-${number}`)) number += 1;
  return `${prefix}-${number}`;
}

/** "Wall A" to "Wall Z", then "Wall 27": the first that is free. */
export function chooseFreeName(taken: ReadonlySet<string>, label: string, lettered: boolean): string {
  const stem = label.charAt(0).toUpperCase() + label.slice(1);
  for (let number = 1; ; number += 1) {
    const mark = lettered && number <= 26 ? String.fromCharCode(64 + number) : String(number);
    const name = `${stem} ${mark}`;
    if (!taken.has(name)) return name;
  }
}

export function defaultCurrentAmplitude(section: Section): string {
  return section === 'E out of plane' ? '1 A' : '1 V';
}

/** Hands out ids and names, keeping those that are there. */
class Naming {
  private readonly ids: Set<string>;
  private readonly names: Set<string>;

  constructor(things: readonly { readonly id?: string | undefined; readonly name?: string | undefined }[]) {
    this.ids = new Set(things.flatMap((thing) => (thing.id === undefined ? [] : [thing.id])));
    this.names = new Set(things.flatMap((thing) => (thing.name === undefined ? [] : [thing.name])));
  }

  name(thing: { readonly id?: string | undefined; readonly name?: string | undefined }, prefix: string, lettered: boolean) {
    const id = thing.id ?? chooseFreeId(this.ids, prefix.replaceAll(' ', '-'));
    const name = thing.name ?? chooseFreeName(this.names, prefix, lettered);
    this.ids.add(id);
    this.names.add(name);
    return { id, name };
  }
}

function completePart(draft: DraftPart, naming: Naming): Part {
  return { ...draft, ...naming.name(draft, draft.kind, true) };
}

function completeDrive(draft: DraftDrive, naming: Naming, section: Section): Drive {
  const named = naming.name(draft, draft.kind, false);
  if (draft.kind === 'plane wave') return { ...draft, ...named };
  return { ...draft, ...named, amplitude: draft.amplitude ?? defaultCurrentAmplitude(section) };
}

/**
 * Time limit for a job that gives none: long enough for the pulse of a band that starts at `from` (100 periods) and for
 * thirty crossings of the sheet; the decay ends most runs far earlier.
 */
function chooseTimeLimit(job: Pick<DraftJob, 'band' | 'sheet' | 'values'>): string {
  const read = makeQuantityReader(job.values);
  const [width, height] = [read(job.sheet.width, 'length'), read(job.sheet.height, 'length')];
  const from = read(job.band.from, 'frequency');
  const crossing = width.ok && height.ok ? Math.hypot(width.value, height.value) / C0 : 0;
  const period = from.ok && from.value > 0 ? 1 / from.value : 0;
  const seconds = Math.max(30 * crossing, 100 * period);
  // Two digits, so that the file stays readable; a job that cannot be read gets any good value and fails elsewhere.
  return Number.isFinite(seconds) && seconds > 0 ? formatQuantity(seconds, 'time', 2) : '100 ns';
}

export function completeJob(draft: DraftJob): Job {
  const naming = new Naming([...draft.parts, ...draft.drives, ...draft.probes, ...draft.materials]);
  const parts = draft.parts.map((part) => completePart(part, naming));
  const drives = draft.drives.map((drive) => completeDrive(drive, naming, draft.section));
  const probes = draft.probes.map((probe): Probe => ({ ...probe, ...naming.name(probe, 'probe', false) }));
  const materials = draft.materials.map((material): OwnMaterial => ({ ...material, name: material.name ?? material.id }));
  const stop = { decay: draft.stop.decay, after: draft.stop.after ?? chooseTimeLimit(draft) };
  return { ...draft, parts, drives, probes, materials, stop };
}
