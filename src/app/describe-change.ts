// Owns saying what differs between two jobs, by the names a person gave: "w 3 mm to 5 mm; Probe 2 added".
// Must not know stores or the run book.
import type { Job } from '../model/job.ts';

/** Differences told; the rest is counted. */
const MOST_TOLD = 3;

const PLACES: Readonly<Record<string, string>> = {
  perWavelength: 'cells per wavelength',
  absorberCells: 'absorber depth',
  courant: 'Courant factor',
  leftOutOfReference: 'left out of the reference',
  magneticLoss: 'magnetic loss',
};

function isRecord(value: unknown): value is Readonly<Record<string, unknown>> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

function write(value: unknown): string | null {
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  if (typeof value === 'string' || typeof value === 'number') return String(value);
  const point = Array.isArray(value) && value.length === 2 && value.every((item) => typeof item === 'string');
  return point ? `(${value.join(', ')})` : null;
}

/** Differences of two plain values; `place` names the values in words. */
function compare(place: string, before: unknown, after: unknown): string[] {
  if (before === after || JSON.stringify(before) === JSON.stringify(after)) return [];
  const [from, to] = [write(before), write(after)];
  if (from !== null && to !== null) return [`${place} ${from} to ${to}`];
  if (isRecord(before) && isRecord(after)) {
    const keys = [...new Set([...Object.keys(before), ...Object.keys(after)])];
    return keys.flatMap((key) => compare(`${place} ${PLACES[key] ?? key}`.trim(), before[key], after[key]));
  }
  return [`${place} changed`];
}

function compareValues(before: Job['values'], after: Job['values']): string[] {
  const names = [...new Set([...Object.keys(before), ...Object.keys(after)])];
  return names.flatMap((name) => {
    const [from, to] = [before[name], after[name]];
    if (from === undefined) return [`${name} = ${to} named`];
    return to === undefined ? [`${name} no longer named`] : compare(name, from, to);
  });
}

interface Named {
  readonly id: string;
  readonly name: string;
}

function compareThings(before: readonly Named[], after: readonly Named[]): string[] {
  const former = new Map(before.map((thing) => [thing.id, thing]));
  const kept = new Set(after.map((thing) => thing.id));
  const removed = before.filter((thing) => !kept.has(thing.id)).map((thing) => `${thing.name} removed`);
  const changes = after.flatMap((thing) => {
    const old = former.get(thing.id);
    if (old === undefined) return [`${thing.name} added`];
    if (old === thing) return [];
    const { name: oldName, ...oldRest } = old;
    const { name, ...rest } = thing;
    return [...(oldName === name ? [] : [`${oldName} renamed ${name}`]), ...compare(name, oldRest, rest)];
  });
  const order = (things: readonly Named[], ids: ReadonlySet<string>): string =>
    things.flatMap((thing) => (ids.has(thing.id) ? [thing.id] : [])).join('\n');
  const both = new Set(before.flatMap((thing) => (kept.has(thing.id) ? [thing.id] : [])));
  const reordered = order(before, both) === order(after, both) ? [] : ['order of parts changed'];
  return [...removed, ...changes, ...reordered];
}

/** Every difference that bears on the answer; title and notes do not. */
export function listChanges(before: Job, after: Job): readonly string[] {
  return [
    ...compareValues(before.values, after.values),
    ...compareThings(before.parts, after.parts),
    ...compareThings(before.drives, after.drives),
    ...compareThings(before.probes, after.probes),
    ...compareThings(before.materials, after.materials),
    ...compare('', before.section, after.section),
    ...compare('band', before.band, after.band),
    ...compare('sheet', before.sheet, after.sheet),
    ...compare('grid', before.grid, after.grid),
    ...compare('reference', before.reference, after.reference),
    ...compare('stop', before.stop, after.stop),
  ].map((text) => text.trim());
}

/** One line; null when nothing that bears on the answer differs. */
export function describeChange(before: Job, after: Job): string | null {
  const changes = listChanges(before, after);
  if (changes.length === 0) return null;
  const told = changes.slice(0, MOST_TOLD).join('; ');
  const more = changes.length - MOST_TOLD;
  return more > 0 ? `${told}; ${more} more` : told;
}
