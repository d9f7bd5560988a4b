// Owns parts as rows of a spreadsheet: kind, material, then lengths; read from pasted text and written for copying.
// Must not know clipboards or screens.
import { findNearestWord } from '../base/nearest-word.ts';
import { fail, ok, type AppError, type Result } from '../base/result.ts';
import type { Job, Part, PartKind, Point } from './job.ts';
import { findMaterial, listMaterialIds } from './materials/library.ts';
import { makePart } from './new-job.ts';

/** What stands in the columns after kind and material; `…` goes on in pairs. */
const COLUMNS: Readonly<Record<PartKind, string>> = {
  wall: 'thickness, x1, y1, x2, y2, …',
  rectangle: 'x1, y1, x2, y2',
  disc: 'x, y, radius',
  ring: 'x, y, inner radius, outer radius, from angle, to angle',
  polygon: 'x1, y1, x2, y2, x3, y3, …',
  stroke: 'width, x1, y1, …',
};

function isKind(word: string): word is PartKind {
  return Object.hasOwn(COLUMNS, word);
}

function rowsOf(text: string): string[][] {
  const rows = text.split(/\r?\n/).map((line) => line.split('\t').map((cell) => cell.trim()));
  return rows.filter((cells) => cells.some((cell) => cell !== ''));
}

function kindOf(cells: readonly string[] | undefined): string {
  return (cells?.[0] ?? '').toLowerCase();
}

/** True when the text has the look of such rows, under a heading or not. */
export function isPartsTable(text: string): boolean {
  const [first, second] = rowsOf(text);
  return text.includes('\t') && (isKind(kindOf(first)) || isKind(kindOf(second)));
}

/**
 * Parts with free ids and names, in the order of the rows. Bare lengths are millimetres, bare angles degrees, a decimal comma is
 * a point; a blank material is `paint`. Errors name the row, counted from 1.
 */
export function readPartsTable(text: string, job: Job, paint: string): Result<readonly Part[]> {
  const rows = rowsOf(text);
  const heading = isKind(kindOf(rows[0])) ? 0 : 1;
  const parts: Part[] = [];
  const errors: AppError[] = [];
  rows.slice(heading).forEach((cells, k) => {
    const part = readRow(cells, { ...job, parts: [...job.parts, ...parts] }, paint, `row ${k + 1 + heading}`);
    if (part.ok) parts.push(part.value);
    else errors.push(...part.errors);
  });
  const [first, ...others] = errors;
  return first === undefined ? ok(parts) : fail(first, ...others);
}

function readRow(cells: readonly string[], job: Job, paint: string, path: string): Result<Part> {
  const kind = kindOf(cells);
  if (!isKind(kind)) {
    const nearest = findNearestWord(kind, Object.keys(COLUMNS));
    const hint = nearest === undefined ? `Begin the row with ${Object.keys(COLUMNS).join(', ')}.` : `Did you mean "${nearest}"?`;
    return fail({ code: 'table', path, message: `"${cells[0]}" is no kind of part.`, hint });
  }
  const material = materialOf(cells[1] ?? '', job, paint);
  if (material === null) {
    return fail({
      code: 'table',
      path,
      message: `"${cells[1]}" is no material of the list or of the job.`,
      hint: 'Write its name or its id, or leave the cell empty for the material of new parts.',
    });
  }
  const last = cells.findLastIndex((cell) => cell !== '');
  const part = makeFrom(kind, job, material, cells.slice(2, last + 1));
  if (part !== null) return ok(part);
  const given = Math.max(0, last - 1);
  return fail({ code: 'table', path, message: `A ${kind} cannot be made of ${given} numbers.`, hint: `Give ${COLUMNS[kind]}.` });
}

function materialOf(cell: string, job: Job, paint: string): string | null {
  if (cell === '') return paint;
  const wanted = cell.toLowerCase();
  const found = listMaterialIds(job).find(
    (id) => id.toLowerCase() === wanted || findMaterial(job, id)?.name.toLowerCase() === wanted,
  );
  return found ?? null;
}

/** Null when the count of cells does not fit the kind. Whether the lengths are good is judged with the job. */
function makeFrom(kind: PartKind, job: Job, material: string, cells: readonly string[]): Part | null {
  const length = cells.map((cell) => quantityOf(cell, 'mm'));
  const pairs = (from: number): Point[] | null =>
    (cells.length - from) % 2 === 0
      ? Array.from({ length: (cells.length - from) / 2 }, (_, k): Point => [length[from + 2 * k]!, length[from + 2 * k + 1]!])
      : null;
  const points = pairs(kind === 'polygon' ? 0 : 1);
  const [a, b, c, d] = length;
  switch (kind) {
    case 'wall':
      return points === null || points.length < 2 ? null : makePart(job, kind, material, { thickness: a!, points });
    case 'stroke':
      return points === null || points.length < 1 ? null : makePart(job, kind, material, { width: a!, points });
    case 'polygon':
      return points === null || points.length < 3 ? null : makePart(job, kind, material, { points });
    case 'rectangle':
      return cells.length === 4 ? makePart(job, kind, material, { from: [a!, b!], to: [c!, d!] }) : null;
    case 'disc':
      return cells.length === 3 ? makePart(job, kind, material, { centre: [a!, b!], radius: c! }) : null;
    case 'ring': {
      if (cells.length !== 4 && cells.length !== 6) return null;
      const [from, to] = cells.length === 4 ? ['0 deg', '360 deg'] : cells.slice(4).map((cell) => quantityOf(cell, 'deg'));
      return makePart(job, kind, material, { centre: [a!, b!], inner: c!, outer: d!, from: from!, to: to! });
    }
  }
}

const BARE_NUMBER = /^[-+\u2212]?(?:\d+[.,]?\d*|[.,]\d+)(?:[eE][-+]?\d+)?$/;

function quantityOf(cell: string, unit: string): string {
  return BARE_NUMBER.test(cell) ? `${cell.replace(',', '.').replace('\u2212', '-')} ${unit}` : cell;
}

/** The rows of these parts, to be pasted into a spreadsheet or into another job. */
export function writePartsTable(parts: readonly Part[]): string {
  return parts.map((part) => [part.kind, part.material, ...cellsOf(part)].join('\t')).join('\n');
}

function cellsOf(part: Part): readonly string[] {
  switch (part.kind) {
    case 'wall':
      return [part.thickness, ...part.points.flat()];
    case 'stroke':
      return [part.width, ...part.points.flat()];
    case 'polygon':
      return part.points.flat();
    case 'rectangle':
      return [...part.from, ...part.to];
    case 'disc':
      return [...part.centre, part.radius];
    case 'ring':
      return [...part.centre, part.inner, part.outer, part.from, part.to];
  }
}
