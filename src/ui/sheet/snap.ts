// Owns snapping: which point of the drawing or of the grid a pointer means, and how that is said in words.
// Must not know the DOM, stores, or tools.
import type { ResolvedJob, XY } from '../../model/job.ts';
import { sheetBox } from './layers/edges-layer.ts';
import { snapStep } from './ticks.ts';
import { distanceToSegment, project } from '../../model/segment.ts';

/** Pointer and target are one within this distance. */
const REACH_PIXELS = 9;

export interface SnapPoint {
  readonly at: XY;
  readonly words: string;
}

export interface SnapLine {
  readonly from: XY;
  readonly to: XY;
  readonly words: string;
}

export interface SnapTargets {
  readonly points: readonly SnapPoint[];
  readonly lines: readonly SnapLine[];
}

export interface Snap {
  readonly at: XY;
  readonly kind: 'point' | 'line' | 'grid' | 'free';
  /** What was met: "corner of Door", "top edge of the sheet"; null on the grid and in the open. */
  readonly words: string | null;
}

/** Rings longer than this are curves flattened for drawing: their vertices mean nothing to a person. */
const CURVE_VERTICES = 24;

/** Everything a point can snap to, except the things named (a part does not snap to itself while it is dragged). */
export function makeSnapTargets(job: ResolvedJob, except: readonly string[] = []): SnapTargets {
  const points: SnapPoint[] = [];
  const lines: SnapLine[] = [];
  for (const part of job.parts) {
    if (except.includes(part.id)) continue;
    for (const ring of part.outline) {
      if (ring.length <= CURVE_VERTICES) addRing(points, lines, ring, part.name);
    }
    const middle = boxMiddle(part.outline.flat());
    if (middle !== null) points.push({ at: middle, words: `centre of ${part.name}` });
  }
  for (const thing of [...job.probes, ...job.drives]) {
    if ('at' in thing && !except.includes(thing.id)) points.push({ at: thing.at, words: thing.name });
  }
  addSheet(points, lines, job);
  return { points, lines };
}

function addRing(points: SnapPoint[], lines: SnapLine[], ring: readonly XY[], name: string): void {
  ring.forEach((from, k) => {
    const to = ring[(k + 1) % ring.length] ?? from;
    points.push({ at: from, words: `corner of ${name}` });
    points.push({ at: [(from[0] + to[0]) / 2, (from[1] + to[1]) / 2], words: `middle of a side of ${name}` });
    lines.push({ from, to, words: `side of ${name}` });
  });
}

function addSheet(points: SnapPoint[], lines: SnapLine[], job: ResolvedJob): void {
  const { left, right, bottom, top } = sheetBox(job.sheet);
  const [x, y] = [(left + right) / 2, (bottom + top) / 2];
  points.push({ at: [0, 0], words: 'origin' }, { at: [x, y], words: 'centre of the sheet' });
  const corners: readonly XY[] = [
    [left, bottom],
    [right, bottom],
    [right, top],
    [left, top],
  ];
  for (const at of corners) points.push({ at, words: 'corner of the sheet' });
  points.push({ at: [left, y], words: 'middle of the left edge' }, { at: [right, y], words: 'middle of the right edge' });
  points.push({ at: [x, bottom], words: 'middle of the bottom edge' }, { at: [x, top], words: 'middle of the top edge' });
  lines.push({ from: [left, bottom], to: [right, bottom], words: 'bottom edge of the sheet' });
  lines.push({ from: [left, top], to: [right, top], words: 'top edge of the sheet' });
  lines.push({ from: [left, bottom], to: [left, top], words: 'left edge of the sheet' });
  lines.push({ from: [right, bottom], to: [right, top], words: 'right edge of the sheet' });
}

function boxMiddle(points: readonly XY[]): XY | null {
  if (points.length === 0) return null;
  const xs = points.map((p) => p[0]);
  const ys = points.map((p) => p[1]);
  return [(Math.min(...xs) + Math.max(...xs)) / 2, (Math.min(...ys) + Math.max(...ys)) / 2];
}

/**
 * The nearest point of the drawing within reach, else a place on a line, else the grid. Suspended (Alt), the pointer is
 * only rounded to a tenth of the grid's step, finer than a pixel, so that no meaningless digits are written.
 */
export function snapTo(at: XY, targets: SnapTargets, pixelsPerMetre: number, suspended: boolean): Snap {
  const step = snapStep(pixelsPerMetre);
  if (suspended) return { at: [roundTo(at[0], step / 10), roundTo(at[1], step / 10)], kind: 'free', words: null };
  const reach = REACH_PIXELS / pixelsPerMetre;
  const point = nearest(targets.points, (p) => Math.hypot(p.at[0] - at[0], p.at[1] - at[1]), reach);
  if (point !== null) return { at: point.at, kind: 'point', words: point.words };
  const line = nearest(targets.lines, (l) => distanceToSegment(at, l.from, l.to), reach);
  if (line !== null) return { at: placeOnLine(at, line, step), kind: 'line', words: line.words };
  return { at: [roundTo(at[0], step), roundTo(at[1], step)], kind: 'grid', words: null };
}

function nearest<T>(candidates: readonly T[], distance: (candidate: T) => number, reach: number): T | null {
  let best: T | null = null;
  let least = reach;
  for (const candidate of candidates) {
    const d = distance(candidate);
    if (d < least) [best, least] = [candidate, d];
  }
  return best;
}

/** Along a line parallel to an axis the other coordinate still snaps to the grid. */
function placeOnLine(at: XY, { from, to }: SnapLine, step: number): XY {
  if (from[0] === to[0]) return [from[0], clamp(roundTo(at[1], step), from[1], to[1])];
  if (from[1] === to[1]) return [clamp(roundTo(at[0], step), from[0], to[0]), from[1]];
  const [x, y] = project(at, from, to);
  return [roundTo(x, step / 100), roundTo(y, step / 100)];
}

function clamp(value: number, a: number, b: number): number {
  return Math.min(Math.max(value, Math.min(a, b)), Math.max(a, b));
}

/** Nearest multiple of `step`, by index so that 0.3 is 0.3 and not 0.30000000000000004. */
export function roundTo(value: number, step: number): number {
  const n = Math.round(value / step);
  // Steps are 1, 2 or 5 times a power of ten: dividing by the whole inverse keeps multiples exact where it is whole.
  const inverse = Math.round(1 / step);
  return Math.abs(inverse * step - 1) < 1e-12 && inverse > 0 ? n / inverse : n * step;
}

/** `to` turned about `from` onto the nearest multiple of 15 degrees, its length rounded to the grid's step. */
export function constrainAngle(from: XY, to: XY, step: number): XY {
  const [dx, dy] = [to[0] - from[0], to[1] - from[1]];
  const fifteen = Math.PI / 12;
  const angle = Math.round(Math.atan2(dy, dx) / fifteen) * fifteen;
  const length = roundTo(dx * Math.cos(angle) + dy * Math.sin(angle), step);
  return polar(from, length, angle);
}

/** `to` moved along its direction from `from` so that their distance is a whole number of steps, at least one. */
export function roundReach(from: XY, to: XY, step: number): XY {
  const [dx, dy] = [to[0] - from[0], to[1] - from[1]];
  const reach = Math.hypot(dx, dy);
  return reach === 0 ? to : polar(from, Math.max(step, roundTo(reach, step)), Math.atan2(dy, dx));
}

export function polar(from: XY, length: number, angle: number): XY {
  // A right angle must not leave 1e-17 behind.
  const quarter = Math.round(angle / (Math.PI / 2));
  if (Math.abs(angle - (quarter * Math.PI) / 2) < 1e-12) {
    const unit = (
      [
        [1, 0],
        [0, 1],
        [-1, 0],
        [0, -1],
      ] as const
    )[((quarter % 4) + 4) % 4] ?? [1, 0];
    return [from[0] + length * unit[0], from[1] + length * unit[1]];
  }
  return [from[0] + length * Math.cos(angle), from[1] + length * Math.sin(angle)];
}
