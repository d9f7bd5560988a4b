// Owns the edits behind the commands: each gives a new job that shares what it did not touch; validity is judged after.
// Must not know history, stores, or how edits are asked for.
import type { Result } from '../base/result.ts';
import { fail, ok } from '../base/result.ts';
import { formatQuantity, parseQuantity } from '../base/quantity.ts';
import type { Drive, EdgeName, Job, Part, Probe, Section } from './job.ts';
import { newId, newName } from './new-job.ts';
import { movePoint } from './parts/points.ts';
import { movePart, PART_KINDS } from './parts/registry.ts';
import { writePath } from './plain-data.ts';

export type Path = readonly (string | number)[];

const OPPOSITE: Readonly<Record<EdgeName, EdgeName>> = { left: 'right', right: 'left', bottom: 'top', top: 'bottom' };

function isEdgeName(step: unknown): step is EdgeName {
  return typeof step === 'string' && Object.hasOwn(OPPOSITE, step);
}

function refusePath(path: Path): Result<never> {
  return fail({
    code: 'path',
    path: writePath(path),
    message: 'There is no such place in the job.',
    hint: 'Choose a value shown in the Brief.',
  });
}

/** `root` with the value at `path` replaced; undefined takes a key away. The way there must exist. */
function replaceAt(root: unknown, path: Path, value: unknown, walked: Path): Result<unknown> {
  const [step, ...rest] = path;
  if (step === undefined) return ok(value);
  const here = [...walked, step];
  if (Array.isArray(root)) {
    if (typeof step !== 'number' || !Number.isInteger(step) || step < 0 || step >= root.length) return refusePath(here);
    const inner = replaceAt(root[step], rest, value, here);
    return inner.ok ? ok(root.with(step, inner.value)) : inner;
  }
  if (typeof root !== 'object' || root === null || typeof step !== 'string' || step === '__proto__') return refusePath(here);
  const former: unknown = Object.hasOwn(root, step) ? (root as Record<string, unknown>)[step] : undefined;
  const inner = replaceAt(former, rest, value, here);
  if (!inner.ok) return inner;
  const others = Object.entries(root).filter(([key]) => key !== step || inner.value !== undefined);
  const entries = others.map(([key, item]): [string, unknown] => [key, key === step ? inner.value : item]);
  if (inner.value !== undefined && !Object.hasOwn(root, step)) entries.push([step, inner.value]);
  return ok(Object.fromEntries(entries));
}

/** Sets one value. An edge that starts or stops repeating takes its opposite with it. */
export function setAt(job: Job, path: Path, value: unknown): Result<unknown> {
  const [first, second, edge] = path;
  if (path.length === 3 && first === 'sheet' && second === 'edges' && isEdgeName(edge)) {
    const other = OPPOSITE[edge];
    const edges: Record<EdgeName, unknown> = { ...job.sheet.edges, [edge]: value };
    if (value === 'repeating' || job.sheet.edges[other] === 'repeating') edges[other] = value;
    return ok({ ...job, sheet: { ...job.sheet, edges } });
  }
  return replaceAt(job, path, value, []);
}

export function insertAt<T>(list: readonly T[], item: T, at = list.length): T[] {
  return list.toSpliced(Math.max(0, Math.min(list.length, at)), 0, item);
}

type Thing = Part | Drive | Probe;

function listOfThing(thing: Thing): 'parts' | 'drives' | 'probes' {
  if (!('kind' in thing)) return 'probes';
  return Object.hasOwn(PART_KINDS, thing.kind) ? 'parts' : 'drives';
}

function refuseId(id: string): Result<never> {
  return fail({ code: 'id', message: `There is nothing with the id "${id}".`, hint: 'It may have been removed; select again.' });
}

export function findUnknownId(job: Job, ids: readonly string[]): Result<readonly string[]> {
  const known = new Set([...job.parts, ...job.drives, ...job.probes, ...job.materials].map((thing) => thing.id));
  const unknown = ids.find((id) => !known.has(id));
  return unknown === undefined ? ok(ids) : refuseId(unknown);
}

export function removeThings(job: Job, ids: readonly string[]): Result<Job> {
  const gone = new Set(ids);
  const isLeft = (thing: { readonly id: string }): boolean => !gone.has(thing.id);
  for (const material of job.materials) {
    const user = gone.has(material.id) ? job.parts.find((part) => part.material === material.id && isLeft(part)) : undefined;
    const fills = gone.has(material.id) && job.sheet.background === material.id;
    if (user !== undefined || fills) {
      return fail({
        code: 'in use',
        message: `${material.name} cannot be removed: ${user === undefined ? 'the sheet is filled with it' : `${user.name} is made of it`}.`,
        hint: 'Give that another material first.',
      });
    }
  }
  return ok({
    ...job,
    parts: job.parts.filter(isLeft),
    drives: job.drives.filter(isLeft),
    probes: job.probes.filter(isLeft),
    materials: job.materials.filter(isLeft),
  });
}

export function putThing(job: Job, thing: Thing): Result<Job> {
  const list = listOfThing(thing);
  const place = job[list].findIndex(({ id }) => id === thing.id);
  if (place < 0) return refuseId(thing.id);
  return ok({ ...job, [list]: (job[list] as readonly Thing[]).with(place, thing) });
}

function moveThing<T extends Thing>(thing: T, dx: number, dy: number): T {
  if ('at' in thing) return { ...thing, at: movePoint(thing.at, dx, dy) };
  return listOfThing(thing) === 'parts' ? (movePart(thing as Part, dx, dy) as T) : thing;
}

export function moveThings(job: Job, ids: readonly string[], dx: number, dy: number): Job {
  const chosen = new Set(ids);
  const moveChosen = <T extends Thing>(thing: T): T => (chosen.has(thing.id) ? moveThing(thing, dx, dy) : thing);
  return { ...job, parts: job.parts.map(moveChosen), drives: job.drives.map(moveChosen), probes: job.probes.map(moveChosen) };
}

const LONGEST_NAME = 190;

/** "Wall B" for a copy of "Wall A"; "Left post copy" for a name a person gave. */
function nameCopy(job: Job, name: string): string {
  const automatic = /^(\p{Lu}[\p{L} ]*) (?:[A-Z]|\d+)$/u.exec(name);
  if (automatic !== null) return newName(job, automatic[1] ?? name, !/\d$/.test(name));
  const names = new Set([...job.parts, ...job.drives, ...job.probes, ...job.materials].map((thing) => thing.name));
  const stem = `${name.slice(0, LONGEST_NAME)} copy`;
  let copyName = stem;
  for (let number = 2; names.has(copyName); number += 1) copyName = `${stem} ${number}`;
  return copyName;
}

/** Copies stand right above their originals in the painting order, shifted. */
export function duplicateThings(job: Job, ids: readonly string[], dx: number, dy: number): Job {
  return ids.reduce((before, id) => {
    for (const list of ['parts', 'drives', 'probes', 'materials'] as const) {
      const things: readonly { readonly id: string; readonly name: string }[] = before[list];
      const place = things.findIndex((thing) => thing.id === id);
      const original = before[list][place];
      if (original === undefined) continue;
      const prefix = list === 'materials' ? 'material' : 'kind' in original ? original.kind : 'probe';
      const named = { id: newId(before, prefix), name: nameCopy(before, original.name) };
      const copy = 'permittivity' in original ? { ...original, ...named } : { ...moveThing(original, dx, dy), ...named };
      return { ...before, [list]: insertAt(things, copy, place + 1) };
    }
    return before;
  }, job);
}

export function reorderPart(job: Job, id: string, to: number): Result<Job> {
  const part = job.parts.find((candidate) => candidate.id === id);
  if (part === undefined) return refuseId(id);
  const others = job.parts.filter((candidate) => candidate.id !== id);
  return ok({ ...job, parts: insertAt(others, part, Math.round(to)) });
}

const PLAIN_AMPLITUDE = /^(\s*[-+]?[\d.]+(?:[eE][-+]?\d+)?\s*[a-zA-Z\u00b5\u03bc]?)[AV](\s*)$/;

/** "2 mA" becomes "2 mV" and back; an expression is replaced by its value. */
function convertAmplitude(text: string, job: Job, section: Section): string {
  const [before, after] = section === 'H out of plane' ? (['current', 'voltage'] as const) : (['voltage', 'current'] as const);
  const plain = PLAIN_AMPLITUDE.exec(text);
  if (plain !== null) return `${plain[1]}${after === 'voltage' ? 'V' : 'A'}${plain[2]}`;
  const value = parseQuantity(text, before, job.values);
  return value.ok ? formatQuantity(value.value, after, 12) : text;
}

export function setSection(job: Job, section: Section): Job {
  if (section === job.section) return job;
  const drives = job.drives.map((drive) =>
    drive.kind === 'line current' ? { ...drive, amplitude: convertAmplitude(drive.amplitude, job, section) } : drive,
  );
  return { ...job, section, drives };
}
