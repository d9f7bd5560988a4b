// Owns the reasons why a job cannot be run: no drive, no launch for its plane wave, too much memory.
// Must not know how the image is written.
import { fail, ok, type Result } from '../base/result.ts';
import type { ResolvedJob } from '../model/job.ts';
import type { Grid } from './grid.ts';
import { align, rowStride } from './image.ts';
import { HEADER_WORDS } from './layout.ts';
import { chooseLaunch, type Launch } from './plane-wave.ts';

/** Steps in one call of the kernel: tables of drives and records are this long. */
export const SLICE_STEPS = 256;
/** Steps that run down the rows together while these are in cache. */
export const BLOCK_STEPS = 8;
/** Images larger than this are refused: a 32-bit address space with room for the page. */
export const MEMORY_LIMIT_BYTES = 1.75 * 2 ** 30;

export interface Bound {
  /** State: fields, absorbers, lines, tables. */
  readonly state: number;
  /** State and the largest fixed part a job of this size can have. */
  readonly total: number;
}

export interface Feasible {
  /** Launch of each plane wave, by drive id. */
  readonly launches: ReadonlyMap<string, Launch>;
  readonly bound: Bound;
}

export function checkFeasible(job: ResolvedJob, grid: Grid): Result<Feasible> {
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
  const bound = boundOf(grid, job);
  if (bound.total > MEMORY_LIMIT_BYTES) {
    return fail({
      code: 'job too large',
      path: 'grid.cells',
      message: `The job needs ${megabytes(bound.total)} MB for ${grid.x.count} by ${grid.y.count} cells; the limit is ${megabytes(MEMORY_LIMIT_BYTES)} MB.`,
      hint: 'Take larger cells, a smaller sheet, or a lower top of the band.',
    });
  }
  return ok({ launches, bound });
}

function megabytes(bytes: number): string {
  return (bytes / 2 ** 20).toFixed(0);
}

/** Upper bounds in bytes, from counts alone. */
function boundOf(grid: Grid, job: ResolvedJob): Bound {
  const { x, y } = grid;
  const stride = rowStride(x.count);
  const rows = y.count + 3;
  const stripColumns = x.before + x.after + 32;
  // Each span's psi is filled to 16 bytes twice; strips have two psi a column, y strips two a cell.
  const psi = 8 * (rows * stripColumns + (y.before + y.after + 4) * (stride + 64));
  const lines = job.drives.filter((drive) => drive.kind === 'plane wave').length;
  const longest = 40 * (x.count + y.count + 80);
  const tables =
    SLICE_STEPS * (8 * job.drives.length + 12 * job.probes.length + lines * 8 * 41) + lines * 24 * longest * (BLOCK_STEPS + 1);
  const state = align(4 * HEADER_WORDS + 12 * rows * stride + psi + tables + 4096);
  const arrays = job.parts.some((part) => part.kind !== 'rectangle') ? 24 * rows * stride : 0;
  return { state, total: state + arrays + rows * 512 };
}
