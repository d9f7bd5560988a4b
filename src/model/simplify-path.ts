// Owns thinning a freehand path: fewer points, none further from the drawn line than a tolerance.
// Must not know the DOM, stores, or parts.
import type { XY } from './job.ts';
import { distanceToSegment } from './segment.ts';

/** Ramer (1972), Douglas & Peucker (1973); with a stack, since a long scribble would overflow recursion. */
export function simplifyPath(points: readonly XY[], tolerance: number): readonly XY[] {
  if (points.length < 3) return points;
  const keep = new Set([0, points.length - 1]);
  const spans: [number, number][] = [[0, points.length - 1]];
  for (let span = spans.pop(); span !== undefined; span = spans.pop()) {
    const [from, to] = span;
    const farthest = farthestBetween(points, from, to);
    if (farthest === null || farthest.distance <= tolerance) continue;
    keep.add(farthest.index);
    spans.push([from, farthest.index], [farthest.index, to]);
  }
  return points.filter((_, k) => keep.has(k));
}

function farthestBetween(points: readonly XY[], from: number, to: number): { index: number; distance: number } | null {
  const [start, end] = [points[from], points[to]];
  if (start === undefined || end === undefined) return null;
  let best: { index: number; distance: number } | null = null;
  for (let k = from + 1; k < to; k++) {
    const point = points[k];
    if (point === undefined) continue;
    const distance = distanceToSegment(point, start, end);
    if (best === null || distance > best.distance) best = { index: k, distance };
  }
  return best;
}
