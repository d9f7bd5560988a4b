// Owns adding, doubling and removing things from the Brief and by command, where no pointer says the place.
// Must not know how things are drawn on the sheet.
import { formatQuantity } from '../../base/quantity.ts';
import type { Drive, Job, Part, PartKind, Point, Probe } from '../../model/job.ts';
import type { Command } from '../../model/commands.ts';
import { findAddedIds } from '../../model/commands.ts';
import { makeLineCurrent, makePart, makePlaneWave, makeProbe } from '../../model/new-job.ts';
import { useJobStore } from '../../app/job-store.ts';
import { tell, tellTrouble } from '../../app/notice-store.ts';
import { useViewStore } from '../../app/view-store.ts';
import { tryCommand } from './editing.ts';

interface Middle {
  readonly x: number;
  readonly y: number;
  /** A good size for a new part, metres. */
  readonly size: number;
}

/** The middle of the sheet, from a job that can be resolved or else a plain guess. */
function findMiddle(): Middle {
  const { resolved } = useJobStore.getState();
  if (!resolved.ok) return { x: 0.02, y: 0.02, size: 0.01 };
  const { widthMetres, heightMetres, originMetres } = resolved.value.sheet;
  const rough = Math.min(widthMetres, heightMetres) / 5;
  const size = Number(rough.toPrecision(1));
  return { x: widthMetres / 2 - originMetres[0], y: heightMetres / 2 - originMetres[1], size };
}

/** Digits of a length chosen by the program. */
const DIGITS = 4;

function at(x: number, y: number): Point {
  return [formatQuantity(x, 'length', DIGITS), formatQuantity(y, 'length', DIGITS)];
}

/** A part of modest size in the middle of the sheet, to be typed into shape. */
export function makeMiddlePart(kind: PartKind, middle: Middle): Part {
  const { job } = useJobStore.getState();
  const { x, y, size } = middle;
  const material = useViewStore.getState().paint;
  const half = size / 2;
  const length = (metres: number): string => formatQuantity(metres, 'length', DIGITS);
  switch (kind) {
    case 'wall':
      return makePart(job, kind, material, { points: [at(x, y - half), at(x, y + half)], thickness: length(size / 10) });
    case 'rectangle':
      return makePart(job, kind, material, { from: at(x - half, y - half), to: at(x + half, y + half) });
    case 'disc':
      return makePart(job, kind, material, { centre: at(x, y), radius: length(half) });
    case 'ring':
      return makePart(job, kind, material, {
        centre: at(x, y),
        inner: length(half / 2),
        outer: length(half),
        from: '0 deg',
        to: '90 deg',
      });
    case 'polygon':
      return makePart(job, kind, material, { points: [at(x - half, y - half), at(x + half, y - half), at(x, y + half)] });
    case 'stroke':
      return makePart(job, kind, material, { points: [at(x - half, y), at(x + half, y)], width: length(size / 10) });
  }
}

function selectAfter(refused: unknown, ids: readonly string[]): void {
  if (refused === null) useViewStore.getState().select(ids);
}

export function addPart(kind: PartKind): void {
  const item = makeMiddlePart(kind, findMiddle());
  selectAfter(tryCommand({ do: 'add', list: 'parts', item }), [item.id]);
}

export function addDrive(kind: Drive['kind']): void {
  const { job } = useJobStore.getState();
  const { x, y } = findMiddle();
  const item = kind === 'plane wave' ? makePlaneWave(job) : makeLineCurrent(job, at(x, y));
  selectAfter(tryCommand({ do: 'add', list: 'drives', item }), [item.id]);
}

export function addProbe(): void {
  const { x, y } = findMiddle();
  const item: Probe = makeProbe(useJobStore.getState().job, at(x, y));
  selectAfter(tryCommand({ do: 'add', list: 'probes', item }), [item.id]);
}

/** Copies stand a little aside, so that both are seen. */
export function duplicate(ids: readonly string[]): void {
  const before = useJobStore.getState().job;
  const aside = findMiddle().size / 4;
  const refused = tryCommand({ do: 'duplicate', ids, dxMetres: aside, dyMetres: -aside });
  selectAfter(refused, findAddedIds(before, useJobStore.getState().job));
}

export function remove(ids: readonly string[], name: string): void {
  const before = useJobStore.getState().job;
  const refused = tryCommand({ do: 'remove', ids });
  if (refused !== null) return tellTrouble(`${name} cannot be removed.`, [refused]);
  const after = useJobStore.getState().job;
  tell(`${name} is removed.`, { label: 'Put it back', run: () => putBack(ids, before, after) });
}

let putBacks = 0;

/** Undoes the removal, or adds the things again when more has been done since. */
function putBack(ids: readonly string[], before: Job, after: Job): void {
  if (useJobStore.getState().job === after) return useJobStore.getState().undo();
  const key = `put back ${(putBacks += 1)}`;
  const wanted = new Set(ids);
  for (const list of ['materials', 'parts', 'drives', 'probes'] as const) {
    for (const [at, item] of before[list].entries()) {
      if (wanted.has(item.id)) tryCommand({ do: 'add', list, item, at } as Command, key);
    }
  }
}

export function duplicateSelected(): void {
  duplicate(useViewStore.getState().selection);
}

export function removeSelected(): void {
  const { selection } = useViewStore.getState();
  remove(selection, selection.length === 1 ? 'The selected thing' : `${selection.length} things`);
}
