// Owns what is said of a run before it starts: grid, step, memory, time, warnings.
// Must not know the DOM, React, workers.
import { ok, type Result } from '../base/result.ts';
import type { ResolvedJob } from '../model/job.ts';
import { checkFeasible } from './feasible.ts';
import { makeGrid, type Grid } from './grid.ts';
import { jobRemarks } from './job-remarks.ts';
import type { Launch } from './plane-wave.ts';
import type { Remark } from './remark.ts';

export interface Estimate {
  /** Cells of the sheet itself. */
  readonly cellsX: number;
  readonly cellsY: number;
  /** Cells stepped, absorbers included. */
  readonly cellsTotal: number;
  readonly dxMetres: number;
  readonly dyMetres: number;
  readonly dtSeconds: number;
  readonly stepLimit: number;
  readonly memoryBytes: number;
  /** At the throughput given to `makeEstimate`, to the time limit; decay usually ends the run earlier. */
  readonly secondsAtMost: number;
  /** Shortest wavelength (densest medium, top of the band) over the larger cell size. */
  readonly cellsPerShortestWavelength: number;
  /** Phase error of the Yee lattice along an axis at the top of the band in the densest medium, degrees per wavelength. */
  readonly phaseErrorDegrees: number;
  /** How the plane wave is launched, in words, or null without one. */
  readonly launch: string | null;
  readonly remarks: readonly Remark[];
}

/**
 * What the run will be, without making its image (milliseconds). `memoryBytes` is an upper bound here and exact in a plan.
 * Fails for the reasons `makePlan` fails (but for a drive in metal), so that they are seen while drawing.
 */
export function makeEstimate(job: ResolvedJob, megaCellsPerSecond: number): Result<Estimate> {
  const grid = makeGrid(job);
  if (!grid.ok) return grid;
  const feasible = checkFeasible(job, grid.value, 1);
  if (!feasible.ok) return feasible;
  const { launches, bound } = feasible.value;
  return ok(estimateOf(job, grid.value, bound.total, megaCellsPerSecond, launches, []));
}

/** Puts the numbers of a grid in words; `more` are remarks found while making the plan. */
export function estimateOf(
  job: ResolvedJob,
  grid: Grid,
  memoryBytes: number,
  megaCellsPerSecond: number,
  launches: ReadonlyMap<string, Launch>,
  more: readonly Remark[],
): Estimate {
  const cellsTotal = (grid.x.lines.length - 1) * (grid.y.lines.length - 1);
  const stepLimit = Math.max(1, Math.ceil(job.stop.afterSeconds / grid.dtSeconds));
  const cellsPerShortestWavelength = grid.shortestWavelengthMetres / Math.max(grid.dxMetres, grid.dyMetres);
  const launch = [...launches.values()][0];
  return {
    cellsX: grid.x.cells,
    cellsY: grid.y.cells,
    cellsTotal,
    dxMetres: grid.dxMetres,
    dyMetres: grid.dyMetres,
    dtSeconds: grid.dtSeconds,
    stepLimit,
    memoryBytes,
    secondsAtMost: (cellsTotal * stepLimit) / (megaCellsPerSecond * 1e6),
    cellsPerShortestWavelength,
    phaseErrorDegrees: phaseErrorDegrees(grid, job.band.toHertz),
    launch: launch?.words ?? null,
    remarks: [...grid.remarks, ...jobRemarks(job, grid, launches, cellsPerShortestWavelength), ...more],
  };
}

/**
 * Phase lag of the lattice along its worse axis, degrees per wavelength, at the shortest wavelength of the job.
 * Source: the Yee dispersion relation, A. Taflove and S. C. Hagness, Computational Electrodynamics, ch. 4.
 */
function phaseErrorDegrees(grid: Grid, hertz: number): number {
  const d = Math.max(grid.dxMetres, grid.dyMetres);
  const k = (2 * Math.PI) / grid.shortestWavelengthMetres;
  const speed = (2 * Math.PI * hertz) / k;
  const s = Math.sin(Math.PI * hertz * grid.dtSeconds);
  const numeric = (2 / d) * Math.asin(Math.min(1, (d / (speed * grid.dtSeconds)) * s));
  return 360 * (numeric / k - 1);
}
