// Owns where perfect metal lies on the lattice: dead u (E out of plane) or blocked links (H out of plane).
// Must not know coefficients or the memory image.
import type { Axis, Grid } from './grid.ts';
import type { Region } from './paint.ts';

/** Bytes, row-major. uDead: y.count rows of x.count. xBlocked: y.count + 1 rows of x.count. yBlocked: y.count rows of x.count + 1. */
export interface MetalMasks {
  readonly uDead: Uint8Array;
  readonly xBlocked: Uint8Array;
  readonly yBlocked: Uint8Array;
}

/**
 * The surface of metal is moved to the nearest grid line, and a wall of any thickness and direction stays closed:
 * - E out of plane: u is dead where metal covers it or reaches more than half way to it along a link; a wall that crosses
 *   a link between two live u kills the nearer one.
 * - H out of plane: a link is blocked when metal lies on it.
 * Returns null when there is no metal.
 */
export function markMetal(grid: Grid, regions: readonly Region[]): MetalMasks | null {
  const rings = regions.filter((region) => region.medium.metal).flatMap((region) => region.rings);
  if (rings.length === 0) return null;
  const { x, y } = grid;
  const uDead = new Uint8Array(x.count * y.count);
  const xBlocked = new Uint8Array(x.count * (y.count + 1));
  const yBlocked = new Uint8Array((x.count + 1) * y.count);
  const edges = collectEdges(rings);
  const closed = grid.section === 'E out of plane';
  const tolerance = 1e-6 * Math.min(grid.dxMetres, grid.dyMetres);

  const rowScan = makeScanner(edges, 0, tolerance, closed);
  for (let j = 0; j < y.count; j++) {
    const intervals = rowScan(insideSheet(y, y.position[j]!, tolerance));
    if (closed) killNodes(x, intervals, tolerance, (i) => (uDead[j * x.count + i] = 1));
    else blockLinks(x, intervals, tolerance, (i) => (yBlocked[j * (x.count + 1) + i] = 1));
  }
  const columnScan = makeScanner(edges, 1, tolerance, closed);
  for (let i = 0; i < x.count; i++) {
    const intervals = columnScan(insideSheet(x, x.position[i]!, tolerance));
    if (closed) killNodes(y, intervals, tolerance, (j) => (uDead[j * x.count + i] = 1));
    else blockLinks(y, intervals, tolerance, (j) => (xBlocked[j * x.count + i] = 1));
  }
  return { uDead, xBlocked, yBlocked };
}

/** Absorbers repeat what stands at the sheet's edge. */
function insideSheet(axis: Axis, at: number, tolerance: number): number {
  const low = axis.lines[axis.before]! + 2 * tolerance;
  const high = axis.lines[axis.before + axis.cells]! - 2 * tolerance;
  return Math.min(high, Math.max(low, at));
}

type Edge = readonly [x0: number, y0: number, x1: number, y1: number];

function collectEdges(rings: readonly (readonly (readonly [number, number])[])[]): Edge[] {
  const edges: Edge[] = [];
  for (const ring of rings) {
    for (let k = 0; k < ring.length; k++) {
      const a = ring[k]!;
      const b = ring[(k + 1) % ring.length]!;
      edges.push([a[0], a[1], b[0], b[1]]);
    }
  }
  return edges;
}

/** Intervals [from, to] of metal, rising and disjoint. */
type Intervals = [from: number, to: number][];

/**
 * Scans lines across the metal: `along` 0 for lines of constant y, 1 for lines of constant x. A closed scan counts the
 * border as metal: it looks just above and just below the line.
 */
function makeScanner(edges: readonly Edge[], along: 0 | 1, tolerance: number, closed: boolean): (at: number) => Intervals {
  const across = 1 - along;
  const sorted = edges
    .map((e) => ({ low: Math.min(e[across]!, e[across + 2]!), high: Math.max(e[across]!, e[across + 2]!), e }))
    .filter((entry) => entry.high > entry.low)
    .sort((a, b) => a.low - b.low);
  let next = 0;
  let active: typeof sorted = [];
  const scan = (at: number): Intervals => {
    const crossings: [number, number][] = [];
    for (const { low, high, e } of active) {
      if (at < low || at >= high) continue;
      const part = (at - e[across]!) / (e[across + 2]! - e[across]!);
      crossings.push([e[along] + part * (e[along + 2]! - e[along]), e[across + 2]! > e[across]! ? 1 : -1]);
    }
    crossings.sort((a, b) => a[0] - b[0]);
    const intervals: Intervals = [];
    let winding = 0;
    let from = 0;
    for (const [where, turn] of crossings) {
      if (winding === 0) from = where;
      winding += turn;
      if (winding === 0) intervals.push([from, where]);
    }
    return intervals;
  };
  // Lines come in rising order, so edges are taken up and dropped as the scan passes them.
  return (at) => {
    while (next < sorted.length && sorted[next]!.low <= at + tolerance) active.push(sorted[next++]!);
    active = active.filter((entry) => entry.high >= at - tolerance);
    return joinIntervals(closed ? [...scan(at - tolerance), ...scan(at + tolerance)] : scan(at), tolerance);
  };
}

function joinIntervals(intervals: Intervals, tolerance: number): Intervals {
  const joined: Intervals = [];
  for (const [from, to] of intervals.sort((a, b) => a[0] - b[0])) {
    const last = joined[joined.length - 1];
    if (last !== undefined && from <= last[1] + tolerance) last[1] = Math.max(last[1], to);
    else joined.push([from, to]);
  }
  return joined;
}

/** Absorbers repeat the edge: an interval that meets the sheet's edge goes on to the end of the axis. */
function extended(axis: Axis, [from, to]: [number, number], tolerance: number): [number, number] {
  const low = axis.lines[axis.before]!;
  const high = axis.lines[axis.before + axis.cells]!;
  return [from <= low + tolerance ? -Infinity : from, to >= high - tolerance ? Infinity : to];
}

function killNodes(axis: Axis, intervals: Intervals, tolerance: number, kill: (k: number) => void): void {
  for (const interval of intervals) {
    const [from, to] = extended(axis, interval, tolerance);
    const first = lowerBound(axis.position, from - tolerance);
    const past = lowerBound(axis.position, to + tolerance);
    for (let k = first; k < past; k++) kill(k);
    const below = first - 1;
    if (first === past) {
      if (below < 0 || past >= axis.count) continue;
      const middle = (axis.position[below]! + axis.position[past]!) / 2;
      kill((from + to) / 2 <= middle + tolerance ? below : past);
      continue;
    }
    if (below >= 0 && from < (axis.position[below]! + axis.position[first]!) / 2 - tolerance) kill(below);
    if (past < axis.count && to > (axis.position[past]! + axis.position[past - 1]!) / 2 + tolerance) kill(past);
  }
}

function blockLinks(axis: Axis, intervals: Intervals, tolerance: number, block: (k: number) => void): void {
  for (const interval of intervals) {
    const [from, to] = extended(axis, interval, tolerance);
    for (let k = lowerBound(axis.position, from + tolerance); k <= axis.count; k++) {
      const start = k > 0 ? axis.position[k - 1]! : -Infinity;
      if (start >= to - tolerance) break;
      block(k);
    }
  }
}

/** First index whose value is at least `at`. */
function lowerBound(values: Float64Array, at: number): number {
  let low = 0;
  let high = values.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (values[middle]! < at) low = middle + 1;
    else high = middle;
  }
  return low;
}
