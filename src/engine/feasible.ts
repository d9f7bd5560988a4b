// Owns the reasons why a job cannot be run: no drive, no launch for its plane wave, too much memory.
// Must not know how the image is written.
import { fail, ok, type Result } from '../base/result.ts';
import type { ResolvedJob, XY } from '../model/job.ts';
import { outlineBounds } from '../model/outline.ts';
import type { Grid } from './grid.ts';
import { align, rowStride } from './image.ts';
import { HEADER_WORDS, MOST_THREADS, SPAN_WORDS } from './layout.ts';
import { chooseLaunch, lineGeometry, type Launch } from './plane-wave.ts';

/** Steps in one call of the kernel: tables of drives and records are this long. */
export const SLICE_STEPS = 256;
/** Steps that run down the rows together while these are in cache. */
export const BLOCK_STEPS = 8;
/** Threads follow each other down the rows block by block: each wants this many rows of its own. */
const ROWS_PER_THREAD = 4 * BLOCK_STEPS;
/** Images larger than this are refused: a 32-bit address space with room for the page. */
export const MEMORY_LIMIT_BYTES = 1.75 * 2 ** 30;

export interface Bound {
  /** State: fields, absorbers, lines, tables. */
  readonly state: number;
  /** State and the largest fixed part a job of this size can have. */
  readonly total: number;
}

export interface Feasible {
  /** Sets of levels of the incident lines: one, or one more than the threads that may work on the run. */
  readonly buffers: number;
  /** Launch of each plane wave, by drive id. */
  readonly launches: ReadonlyMap<string, Launch>;
  readonly bound: Bound;
}

/** `threads` is how many may work on the run; fewer are planned for when there are few rows, or when rows close a loop. */
export function checkFeasible(job: ResolvedJob, grid: Grid, threads: number): Result<Feasible> {
  if (job.drives.length === 0) {
    return fail({
      code: 'no drive',
      path: 'drives',
      message: 'Nothing launches a wave.',
      hint: 'Add a plane wave or a line current.',
    });
  }
  const launches = new Map<string, Launch>();
  for (const drive of job.drives) {
    if (drive.kind !== 'plane wave') continue;
    const launch = chooseLaunch(job, grid, drive);
    if (!launch.ok) return launch;
    launches.set(drive.id, launch.value);
  }
  // A repeating top edge closes the loop of rows after every step: no block can follow another.
  const useful = grid.y.repeats ? 1 : Math.min(threads, MOST_THREADS, Math.floor(grid.y.count / ROWS_PER_THREAD));
  const buffers = useful > 1 ? useful + 1 : 1;
  const lines = job.drives.flatMap((drive) =>
    drive.kind === 'plane wave' ? [lineGeometry(grid, drive, launches.get(drive.id)!)] : [],
  );
  const bound = boundOf(grid, job, lines, buffers);
  if (bound.total > MEMORY_LIMIT_BYTES && buffers > 1) return checkFeasible(job, grid, 1);
  if (bound.total > MEMORY_LIMIT_BYTES) {
    return fail({
      code: 'job too large',
      path: 'grid.cells',
      message: `The job needs ${megabytes(bound.total)} MB for ${grid.x.count} by ${grid.y.count} cells; the limit is ${megabytes(MEMORY_LIMIT_BYTES)} MB.`,
      hint: 'Take larger cells, a smaller sheet, or a lower top of the band.',
    });
  }
  return ok({ launches, bound, buffers });
}

function megabytes(bytes: number): string {
  return (bytes / 2 ** 20).toFixed(0);
}

/** Upper bounds in bytes, from counts alone. */
function boundOf(
  grid: Grid,
  job: ResolvedJob,
  lines: readonly { readonly length: number; readonly fed: number }[],
  buffers: number,
): Bound {
  const { x, y } = grid;
  const stride = rowStride(x.count);
  const rows = y.count + 3;
  const stripColumns = x.before + x.after + 32;
  // Each span's psi is filled to 16 bytes twice; strips have two psi a column, y strips two a cell.
  const psi = 8 * (rows * stripColumns + (y.before + y.after + 4) * (stride + 64));
  const levels = lines.reduce(
    (sum, line) => sum + (24 * line.length + 16) * (BLOCK_STEPS + 1) * buffers + 8 * SLICE_STEPS * line.fed + 64,
    0,
  );
  const tables = SLICE_STEPS * (8 * job.drives.length + 12 * job.probes.length) + levels;
  const state = align(4 * HEADER_WORDS + 12 * rows * stride + psi + tables + 4096);
  const fixed = coefficientBytes(grid, job, stride) + lines.reduce((sum, line) => sum + 32 * line.length, 0);
  return { state, total: state + fixed };
}

/** Rows of their own content hold arrays; every row holds a program, a record for each of its spans. */
function coefficientBytes(grid: Grid, job: ResolvedJob, stride: number): number {
  const { x, y } = grid;
  const rows = y.count + 2;
  const lossy = [job.sheet.background, ...job.parts.map((part) => part.medium)].some(
    (medium) => !medium.metal && (medium.sigma > 0 || medium.sigmaMagnetic > 0),
  );
  let ownRows = y.before + y.after + 4;
  let corners = 0;
  for (const part of job.parts) {
    const { bottom, top } = outlineBounds(part.outline);
    const tall = Math.ceil((top - bottom) / grid.dyMetres);
    // Of an upright rectangle only the rows at its upper and lower side differ, and those between from those without it.
    ownRows += isUpright(part.outline) ? 10 : tall + 4;
    corners += part.outline.reduce((sum, ring) => sum + ring.length, 0);
  }
  // A plain span is at least four groups of four cells long, so there are at most two spans to five groups.
  const spans = Math.min(Math.ceil(0.1 * stride) + 8, 5 + 2 * corners + x.before + x.after);
  const perRow = 4 * SPAN_WORDS * spans + 64;
  return Math.min(rows, ownRows) * stride * 4 * (lossy ? 6 : 3) + rows * perRow + 400 * job.probes.length + 8192;
}

function isUpright(outline: readonly (readonly XY[])[]): boolean {
  return outline.every((ring) =>
    ring.every((at, k) => {
      const next = ring[(k + 1) % ring.length]!;
      return at[0] === next[0] || at[1] === next[1];
    }),
  );
}
