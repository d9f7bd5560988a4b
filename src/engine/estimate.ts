// Owns what is said of a run before it starts: grid, step, memory, time, warnings.
// Must not know the DOM, React, workers.
import { ok, type Result } from '../base/result.ts';
import type { ResolvedJob } from '../model/job.ts';
import { checkFeasible } from './feasible.ts';
import { makeGrid, type Grid } from './grid.ts';
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
    remarks: [
      ...grid.remarks,
      ...resolutionRemarks(job, grid, cellsPerShortestWavelength),
      ...probeRemarks(job, grid, launches),
      ...driveRemarks(job),
      ...more,
    ],
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

function resolutionRemarks(job: ResolvedJob, grid: Grid, cellsPerShortestWavelength: number): Remark[] {
  const remarks: Remark[] = [];
  if (cellsPerShortestWavelength < 10) {
    remarks.push({
      code: 'coarse grid',
      path: 'grid.cells',
      message: `Only ${cellsPerShortestWavelength.toFixed(1)} cells per shortest wavelength: below 10 the wave is visibly slow; 20 is usual (common practice).`,
    });
  }
  const cell = Math.max(grid.dxMetres, grid.dyMetres);
  for (const part of job.parts) {
    if (part.smallestMetres >= 2 * cell) continue;
    const cells = part.smallestMetres / cell;
    remarks.push({
      code: 'part near cell size',
      path: part.id,
      message: `${part.name} is ${(part.smallestMetres * 1e3).toPrecision(3)} mm across, ${cells.toFixed(1)} cells of ${(cell * 1e3).toPrecision(3)} mm: ${
        job.parts.some((other) => other.medium.metal)
          ? 'edges of metal are moved to the nearest grid line, so its width is rounded to whole cells'
          : 'it is averaged into its cells'
      }. Take smaller cells to resolve it.`,
    });
  }
  return remarks;
}

function probeRemarks(job: ResolvedJob, grid: Grid, launches: ReadonlyMap<string, Launch>): Remark[] {
  const remarks: Remark[] = [];
  for (const launch of launches.values()) {
    const { x, y } = grid;
    for (const probe of job.probes) {
      const px = probe.at[0] + job.sheet.originMetres[0];
      const py = probe.at[1] + job.sheet.originMetres[1];
      const inside =
        px >= x.position[launch.i0]! &&
        px <= x.position[launch.i1]! &&
        py >= y.position[launch.j0]! &&
        py <= y.position[launch.j1]!;
      // Over the full height the sides of the sheet are not faces.
      const aside =
        launch.kind === 'full height' && (launch.faces[0] === 'left' || launch.faces[0] === 'right')
          ? px >= x.position[launch.i0]! && px <= x.position[launch.i1]!
          : py >= y.position[launch.j0]! && py <= y.position[launch.j1]!;
      if (launch.kind === 'box' ? inside : aside) continue;
      remarks.push({
        code: 'probe in scattered field',
        path: probe.id,
        message: `${probe.name} stands outside the total field: it reads the scattered (reflected) field only.`,
      });
    }
  }
  return remarks;
}

function driveRemarks(job: ResolvedJob): Remark[] {
  const [first, ...others] = job.drives;
  if (first === undefined || others.every((drive) => JSON.stringify(drive.waveform) === JSON.stringify(first.waveform)))
    return [];
  return [
    {
      code: 'several waveforms',
      path: first.id,
      message: `The drives have different waveforms: levels are read against that of ${first.name}; insertion ratios are those of all together.`,
    },
  ];
}
