// Owns low-level access to a run for the evidence: its unknowns and coefficients by column and row, set and read between steps.
// Must not know what is concluded from them.
import { readFile } from 'node:fs/promises';
import { makeCoefficients, type CoefficientRow } from '../../src/engine/coefficients.ts';
import { makeGrid } from '../../src/engine/grid.ts';
import { paintParts } from '../../src/engine/paint.ts';
import { makePlan } from '../../src/engine/plan.ts';
import { parseJob } from '../../src/model/parse-job.ts';
import { resolveJob } from '../../src/model/resolve-job.ts';
import { openRun } from '../../workers/run.ts';
import { unwrap } from './run-job.ts';

/** Columns before the first unknown and rows before the first one in the image. */
const PAD_COLUMNS = 4;
const PAD_ROWS = 1;

export interface SteppedSheet {
  readonly columns: number;
  readonly rows: number;
  /** The coefficients the kernel uses, in its own single precision; rows 0 to `rows`, the last holding links only. */
  readonly coefficients: readonly CoefficientRow[];
  /** vx(j, i) is the link below u(j, i), vy(j, i) the one to its left. */
  get(field: Field, j: number, i: number): number;
  set(field: Field, j: number, i: number, value: number): void;
  advance(steps: number): void;
}

export type Field = 'u' | 'vx' | 'vy';

export async function openSheet(draft: unknown): Promise<SteppedSheet> {
  const job = unwrap(resolveJob(unwrap(parseJob(draft))));
  const plan = unwrap(makePlan(job, 'main'));
  const kernel = await WebAssembly.compile(await readFile(new URL('../../workers/kernel/kernel.wasm', import.meta.url)));
  const run = unwrap(openRun(plan, kernel));
  const regions = paintParts(job.parts, job.sheet);
  const coefficients = makeCoefficients(unwrap(makeGrid(job)), regions, job.sheet.background, job.band);
  const { fields } = plan;
  const starts = { u: fields.uOffset >> 2, vx: fields.vxOffset >> 2, vy: fields.vyOffset >> 2 };
  const index = (field: Field, j: number, i: number): number => starts[field] + (j + PAD_ROWS) * fields.stride + PAD_COLUMNS + i;
  return {
    columns: fields.countX,
    rows: fields.countY,
    coefficients: Array.from({ length: fields.countY + 1 }, (_, j) => coefficients.rowAt(j)),
    get: (field, j, i) => run.image[index(field, j, i)] ?? NaN,
    set(field, j, i, value) {
      run.image[index(field, j, i)] = value;
    },
    advance(steps) {
      for (let left = steps; left > 0; left -= plan.slice) run.advance(Math.min(left, plan.slice));
    },
  };
}

/** Fills u with even noise between -1 and 1 wherever it is free to move, the same noise for the same seed (mulberry32). */
export function fillWithNoise(sheet: SteppedSheet, seed: number): void {
  let state = seed;
  const next = (): number => {
    state = (state + 0x6d2b79f5) | 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 31 - 1;
  };
  for (let j = 0; j < sheet.rows; j++) {
    for (let i = 0; i < sheet.columns; i++) {
      const value = next();
      if (coefficientOf(sheet, 'u', j, i) > 0) sheet.set('u', j, i, value);
    }
  }
}

/** b of an unknown; 0 where it is held still. */
export function coefficientOf(sheet: SteppedSheet, field: Field, j: number, i: number): number {
  const row = sheet.coefficients[j];
  const values = field === 'u' ? row?.bu : field === 'vx' ? row?.bvx : row?.bvy;
  return values?.[i] ?? 0;
}
