// Owns the grid of a job: lines, spacings, where u and the links stand, the time step.
// Must not know media beyond their wave speeds, the memory image, or the clock.
import { C0 } from '../base/constants.ts';
import { fail, ok, type Result } from '../base/result.ts';
import type { EdgeKind, Medium, ResolvedJob, Section } from '../model/job.ts';
import type { Remark } from './remark.ts';

/** One axis of the lattice. Positions in metres from the sheet's left or bottom edge; absorbers lie outside the sheet. */
export interface Axis {
  /** Grid lines, absorbers included: cells + 1. */
  readonly lines: Float64Array;
  /** Absorber cells before and after the sheet. */
  readonly before: number;
  readonly after: number;
  /** Cells of the sheet. */
  readonly cells: number;
  /** Unknowns u along this axis. */
  readonly count: number;
  readonly position: Float64Array;
  /** Side of the cell round u (dual spacing for E out of plane, spacing for H out of plane). */
  readonly width: Float64Array;
  /** count + 1 links; link k stands before u[k] and joins it to u[k - 1]. */
  readonly linkPosition: Float64Array;
  readonly linkLength: Float64Array;
  /** 1 where the link carries a field: 0 where the sheet ends in a wall on which the link's field vanishes. */
  readonly linkOpen: Uint8Array;
  readonly repeats: boolean;
  /** Half cells (numbered over 2 x all cells) under u: first and last, equal at a magnetic edge. */
  readonly box: Int32Array;
  /** Half cells under a link: first and last. */
  readonly linkBox: Int32Array;
}

export interface Grid {
  readonly section: Section;
  readonly x: Axis;
  readonly y: Axis;
  readonly dxMetres: number;
  readonly dyMetres: number;
  readonly dtSeconds: number;
  readonly shortestWavelengthMetres: number;
  readonly remarks: readonly Remark[];
}

/** Largest number of cells along one axis; beyond it the image would not fit anyway. */
const MOST_CELLS = 60000;

/** Refractive index of the real part of the wave number at `hertz`: loss shortens the wave too. */
export function refractiveIndex(medium: Medium, hertz: number): number {
  const tangent = medium.sigma / (2 * Math.PI * hertz * 8.8541878188e-12 * medium.epsilonRelative);
  return Math.sqrt((medium.epsilonRelative * medium.muRelative * (1 + Math.sqrt(1 + tangent * tangent))) / 2);
}

/** Makes the grid: uniform spacing for now, carried as arrays per axis. Errors when a cell count is out of range. */
export function makeGrid(job: ResolvedJob): Result<Grid> {
  const media = [job.sheet.background, ...job.parts.map((part) => part.medium)].filter((medium) => !medium.metal);
  const slowest = Math.max(...media.map((medium) => refractiveIndex(medium, job.band.toHertz)));
  const shortestWavelengthMetres = C0 / (job.band.toHertz * slowest);
  const { widthMetres, heightMetres, originMetres, edges } = job.sheet;
  const wanted =
    'perWavelength' in job.grid.cells
      ? { x: shortestWavelengthMetres / job.grid.cells.perWavelength, y: shortestWavelengthMetres / job.grid.cells.perWavelength }
      : { x: job.grid.cells.xMetres, y: job.grid.cells.yMetres };
  const typed = !('perWavelength' in job.grid.cells);
  const remarks: Remark[] = [];
  const counts = { x: 0, y: 0 };
  for (const axis of ['x', 'y'] as const) {
    const length = axis === 'x' ? widthMetres : heightMetres;
    const cells = length / wanted[axis];
    if (!(cells <= MOST_CELLS)) {
      return fail({
        code: 'grid too fine',
        path: 'grid.cells',
        message: `${Math.round(cells)} cells along ${axis} are more than ${MOST_CELLS}.`,
        hint: 'Take larger cells, fewer cells per wavelength, a smaller sheet or a lower top of the band.',
      });
    }
    const snapped = typed
      ? Math.max(2, Math.round(cells))
      : alignedCount(Math.max(2, Math.ceil(cells - 1e-6)), length, metalEdges(job, axis, originMetres[axis === 'x' ? 0 : 1]));
    counts[axis] = snapped;
    if (typed && Math.abs(cells - snapped) > 1e-6 * cells) {
      remarks.push({
        code: 'cell size adjusted',
        path: `grid.cells.${axis}`,
        message: `The cell along ${axis} is ${((length / snapped) * 1e3).toPrecision(6)} mm, so that a whole number fits the sheet.`,
      });
    }
  }
  const dxMetres = widthMetres / counts.x;
  const dyMetres = heightMetres / counts.y;
  const depth = job.grid.absorberCells;
  const fastest = C0 / Math.sqrt(Math.min(...media.map((medium) => medium.epsilonRelative * medium.muRelative)));
  const dtSeconds = job.grid.courant / (fastest * Math.hypot(1 / dxMetres, 1 / dyMetres));
  return ok({
    section: job.section,
    x: makeAxis(job.section, counts.x, dxMetres, edges.left, edges.right, depth),
    y: makeAxis(job.section, counts.y, dyMetres, edges.bottom, edges.top, depth),
    dxMetres,
    dyMetres,
    dtSeconds,
    shortestWavelengthMetres,
    remarks,
  });
}

/** Coordinates (from the sheet's corner) where drawn metal has straight edges across `axis`. */
function metalEdges(job: ResolvedJob, axis: 'x' | 'y', origin: number): number[] {
  const along = axis === 'x' ? 0 : 1;
  const across = 1 - along;
  const length = axis === 'x' ? job.sheet.widthMetres : job.sheet.heightMetres;
  const found = new Set<number>();
  const anyMetal = job.parts.some((part) => part.medium.metal);
  for (const part of job.parts) {
    // Cut-outs in metal count like the metal itself.
    if (!anyMetal) break;
    for (const ring of part.outline) {
      for (let k = 0; k < ring.length; k++) {
        const a = ring[k];
        const b = ring[(k + 1) % ring.length];
        if (a === undefined || b === undefined) continue;
        const straight = Math.abs(a[along] - b[along]) < 1e-9 * length && Math.abs(a[across]! - b[across]!) > 1e-6 * length;
        const at = a[along] + origin;
        if (straight && at > 0 && at < length) found.add(Math.round((at / length) * 1e9) / 1e9);
      }
    }
    if (found.size > 64) break;
  }
  return [...found].map((fraction) => fraction * length);
}

/**
 * Smallest count from `least` to 1.3 times it whose lines meet all `edges` within 1 % of a cell; failing that, the count
 * with the smallest misfit. Metal lies on lines, so an edge between lines would be moved by up to half a cell.
 */
function alignedCount(least: number, length: number, edges: readonly number[]): number {
  if (edges.length === 0) return least;
  let best = least;
  let bestMisfit = Infinity;
  for (let count = least; count <= Math.ceil(least * 1.3); count++) {
    let misfit = 0;
    for (const edge of edges) {
      const cells = (edge / length) * count;
      misfit = Math.max(misfit, Math.abs(cells - Math.round(cells)));
    }
    if (misfit < 0.01) return count;
    if (misfit < bestMisfit - 0.02) {
      best = count;
      bestMisfit = misfit;
    }
  }
  return best;
}

/** Builds one axis. E out of plane puts u on the lines, H out of plane between them: tangential E lies on the edges. */
export function makeAxis(section: Section, cells: number, spacing: number, low: EdgeKind, high: EdgeKind, depth: number): Axis {
  const before = low === 'absorbing' ? depth : 0;
  const after = high === 'absorbing' ? depth : 0;
  const all = before + cells + after;
  const lines = new Float64Array(all + 1);
  for (let k = 0; k <= all; k++) lines[k] = (k - before) * spacing;
  const size = new Float64Array(all);
  for (let k = 0; k < all; k++) size[k] = lines[k + 1]! - lines[k]!;
  const repeats = low === 'repeating';
  const wrap = (k: number): number => (repeats ? (k + all) % all : k);
  const half = (k: number): number => (k < 0 || k >= all ? (repeats ? size[wrap(k)]! / 2 : 0) : size[k]! / 2);
  const common = { lines, before, after, cells, repeats };

  if (section === 'E out of plane') {
    const first = low === 'magnetic' || repeats ? 0 : 1;
    const last = high === 'magnetic' ? all : all - 1;
    const count = last - first + 1;
    const axis = { ...common, count, ...emptyAxis(count) };
    for (let i = 0; i < count; i++) {
      const k = first + i;
      axis.position[i] = lines[k]!;
      axis.width[i] = half(k - 1) + half(k);
      const below = k > 0 || repeats ? 2 * wrap(k - 1) + 1 : -1;
      const above = k < all ? 2 * k : -1;
      axis.box[2 * i] = below < 0 ? above : below;
      axis.box[2 * i + 1] = above < 0 ? below : above;
    }
    for (let i = 0; i <= count; i++) {
      const k = first + i - 1;
      const cell = Math.min(all - 1, Math.max(0, wrap(k)));
      // A closed link stands on its magnetic wall, where the field along it is zero.
      const wall = i === 0 ? lines[0]! : lines[all]!;
      axis.linkPosition[i] = (k >= 0 && k < all) || repeats ? (lines[cell]! + lines[cell + 1]!) / 2 : wall;
      axis.linkLength[i] = size[cell]!;
      axis.linkOpen[i] = k >= 0 && k < all ? 1 : repeats ? 1 : 0;
      axis.linkBox[2 * i] = 2 * cell;
      axis.linkBox[2 * i + 1] = 2 * cell + 1;
    }
    return axis;
  }

  const axis = { ...common, count: all, ...emptyAxis(all) };
  for (let i = 0; i < all; i++) {
    axis.position[i] = (lines[i]! + lines[i + 1]!) / 2;
    axis.width[i] = size[i]!;
    axis.box[2 * i] = 2 * i;
    axis.box[2 * i + 1] = 2 * i + 1;
  }
  for (let i = 0; i <= all; i++) {
    const edge = i === 0 ? low : i === all ? high : null;
    axis.linkPosition[i] = lines[i]!;
    axis.linkLength[i] = half(i - 1) + half(i);
    axis.linkOpen[i] = edge === null || edge === 'magnetic' || edge === 'repeating' ? 1 : 0;
    const below = i > 0 || repeats ? 2 * wrap(i - 1) + 1 : 0;
    const above = i < all ? 2 * i : repeats ? 0 : below;
    axis.linkBox[2 * i] = below;
    axis.linkBox[2 * i + 1] = above;
  }
  return axis;
}

function emptyAxis(count: number) {
  return {
    position: new Float64Array(count),
    width: new Float64Array(count),
    linkPosition: new Float64Array(count + 1),
    linkLength: new Float64Array(count + 1),
    linkOpen: new Uint8Array(count + 1),
    box: new Int32Array(2 * count),
    linkBox: new Int32Array(2 * count + 2),
  };
}
