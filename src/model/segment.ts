// Owns the nearest point of a straight piece, and how far off it lies.
// Must not know what the piece belongs to.
import type { XY } from './job.ts';

export function project(at: XY, from: XY, to: XY): XY {
  const [dx, dy] = [to[0] - from[0], to[1] - from[1]];
  const square = dx * dx + dy * dy;
  const t = square === 0 ? 0 : Math.min(1, Math.max(0, ((at[0] - from[0]) * dx + (at[1] - from[1]) * dy) / square));
  return [from[0] + t * dx, from[1] + t * dy];
}

export function distanceToSegment(at: XY, from: XY, to: XY): number {
  const [x, y] = project(at, from, to);
  return Math.hypot(at[0] - x, at[1] - y);
}
