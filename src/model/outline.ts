// Owns closed outlines in metres: circles, unions, offsets of lines, area, containment.
// Must not know parts, jobs, or the grid.
import { thicken, unite, type LineEnds, type WholePaths } from '../base/clip-paths.ts';
import { simplifyPath } from './simplify-path.ts';
import type { Outline, XY } from './job.ts';

type Ring = readonly XY[];

/** Segments of a whole turn: the sagitta 1 - cos(pi/360) is 3.8e-5 of the radius; a multiple of four keeps the symmetry. */
const SEGMENTS_PER_TURN = 360;
const SAGITTA = 1e-4;
/** Above 1/sin(half the corner) = 10 (corners under 11.5 deg) a mitre is cut off. */
const MITRE_LIMIT = 10;
/** Longest ring tested for crossing itself pair by pair; longer ones go through the union at once. */
const LONGEST_PAIR_TEST = 400;

export function signedArea(ring: Ring): number {
  let twice = 0;
  const [ax, ay] = ring[0] ?? [0, 0];
  for (let k = 0; k < ring.length; k += 1) {
    const [x0, y0] = ring[k] ?? [0, 0];
    const [x1, y1] = ring[(k + 1) % ring.length] ?? [0, 0];
    twice += (x0 - ax) * (y1 - ay) - (x1 - ax) * (y0 - ay);
  }
  return twice / 2;
}

/** Square metres; holes count negative. */
export function outlineArea(outline: Outline): number {
  return outline.reduce((sum, ring) => sum + signedArea(ring), 0);
}

function orient(ring: Ring, counterClockwise: boolean): Ring {
  return signedArea(ring) > 0 === counterClockwise ? ring : ring.toReversed();
}

export interface Bounds {
  readonly left: number;
  readonly right: number;
  readonly bottom: number;
  readonly top: number;
}

export function outlineBounds(outline: Outline): Bounds {
  let [left, right, bottom, top] = [Infinity, -Infinity, Infinity, -Infinity];
  for (const ring of outline) {
    for (const [x, y] of ring) {
      left = Math.min(left, x);
      right = Math.max(right, x);
      bottom = Math.min(bottom, y);
      top = Math.max(top, y);
    }
  }
  return { left, right, bottom, top };
}

/** True when (x, y), in metres, lies inside; on the edge either may come out. */
export function partContains(outline: Outline, x: number, y: number): boolean {
  let inside = false;
  for (const ring of outline) {
    let [xa, ya] = ring.at(-1) ?? [0, 0];
    for (const [xb, yb] of ring) {
      if (yb > y !== ya > y && x < ((xa - xb) * (y - yb)) / (ya - yb) + xb) inside = !inside;
      xa = xb;
      ya = yb;
    }
  }
  return inside;
}

/**
 * Points on an arc, counter-clockwise, ends included. The radius is drawn larger by a hair so that the polygon has the
 * area of the true sector: what the grid sees is the covered area.
 */
export function makeArc(centre: XY, radius: number, fromRadians: number, toRadians: number): XY[] {
  const turn = toRadians - fromRadians;
  const segments = Math.max(1, Math.ceil((Math.abs(turn) / (2 * Math.PI)) * SEGMENTS_PER_TURN - 1e-9));
  const step = turn / segments;
  const drawn = radius * Math.sqrt(step / Math.sin(step));
  return Array.from({ length: segments + 1 }, (_, k): XY => {
    const angle = fromRadians + k * step;
    return [centre[0] + drawn * Math.cos(angle), centre[1] + drawn * Math.sin(angle)];
  });
}

export function makeCircle(centre: XY, radius: number): XY[] {
  return makeArc(centre, radius, 0, 2 * Math.PI).slice(0, -1);
}

/** Clipping works in integers: 1 nm, finer for small drawings (a millionth of a thousandth of the extent). */
function chooseStepsPerMetre(points: readonly XY[], reachMetres: number): number {
  let extent = reachMetres;
  for (const [x, y] of points) extent = Math.max(extent, Math.abs(x) + reachMetres, Math.abs(y) + reachMetres);
  return Math.max(1e9, 10 ** Math.floor(9 - Math.log10(extent)));
}

function toSteps(rings: readonly Ring[], stepsPerMetre: number): WholePaths {
  return rings.map((ring) => ring.map(([x, y]) => ({ x: Math.round(x * stepsPerMetre), y: Math.round(y * stepsPerMetre) })));
}

function fromSteps(paths: WholePaths, stepsPerMetre: number): Outline {
  return paths.map((path) => path.map(({ x, y }): XY => [x / stepsPerMetre, y / stepsPerMetre]));
}

function cross(o: XY, a: XY, b: XY): number {
  return (a[0] - o[0]) * (b[1] - o[1]) - (a[1] - o[1]) * (b[0] - o[0]);
}

/** Touching counts: a ring with a keyhole is not simple. */
function segmentsMeet(a: XY, b: XY, c: XY, d: XY): boolean {
  if (Math.max(a[0], b[0]) < Math.min(c[0], d[0]) || Math.max(c[0], d[0]) < Math.min(a[0], b[0])) return false;
  if (Math.max(a[1], b[1]) < Math.min(c[1], d[1]) || Math.max(c[1], d[1]) < Math.min(a[1], b[1])) return false;
  return cross(a, b, c) * cross(a, b, d) <= 0 && cross(c, d, a) * cross(c, d, b) <= 0;
}

function isSimple(ring: Ring): boolean {
  const n = ring.length;
  if (n > LONGEST_PAIR_TEST) return false;
  const at = (k: number): XY => ring[k % n] ?? [0, 0];
  for (let i = 0; i < n; i += 1) {
    for (let j = i + 2; j < n; j += 1) {
      const neighbours = i === 0 && j === n - 1;
      if (!neighbours && segmentsMeet(at(i), at(i + 1), at(j), at(j + 1))) return false;
    }
  }
  return true;
}

/** Pairs of pieces of a line that meet, neighbours aside; stops counting above `most`. Sorted by x, so local lines are quick. */
export function countCrossings(points: readonly XY[], most: number): number {
  const pieces = points.slice(1).map((b, k) => {
    const a = points[k] ?? b;
    return { a, b, k, left: Math.min(a[0], b[0]), right: Math.max(a[0], b[0]) };
  });
  pieces.sort((p, q) => p.left - q.left);
  let count = 0;
  for (const [i, p] of pieces.entries()) {
    for (let j = i + 1; j < pieces.length; j += 1) {
      const q = pieces[j];
      if (q === undefined || q.left > p.right) break;
      if (Math.abs(p.k - q.k) > 1 && segmentsMeet(p.a, p.b, q.a, q.b)) count += 1;
      if (count > most) return count;
    }
  }
  return count;
}

function dropRepeats(points: readonly XY[]): XY[] {
  return points.filter((p, k) => {
    const before = points[k - 1];
    return before === undefined || before[0] !== p[0] || before[1] !== p[1];
  });
}

/** Outline of a closed ring as drawn; where it crosses itself the lobes are joined. Empty when it encloses nothing. */
export function makeRingOutline(points: readonly XY[]): Outline {
  const ring = dropRepeats(points);
  const [first, last] = [ring[0], ring.at(-1)];
  if (ring.length > 1 && first !== undefined && last !== undefined && first[0] === last[0] && first[1] === last[1]) ring.pop();
  if (ring.length < 3) return [];
  if (isSimple(ring)) return signedArea(ring) === 0 ? [] : [orient(ring, true)];
  const steps = chooseStepsPerMetre(ring, 0);
  return fromSteps(unite(toSteps([ring], steps)), steps);
}

/** A line given a thickness: ends cut square and corners mitred, or both round. A closed line has no ends. */
export function makeLineOutline(points: readonly XY[], thickness: number, style: 'square' | 'round'): Outline {
  const line = dropRepeats(points);
  const [first, second] = line;
  if (first === undefined) return [];
  if (second === undefined) return style === 'round' ? [makeCircle(first, thickness / 2)] : [];
  if (line.length === 2 && style === 'square') return [makeBar(first, second, thickness)];
  const last = line.at(-1) ?? first;
  const closed = line.length > 3 && last[0] === first[0] && last[1] === first[1];
  if (closed) line.pop();
  const half = thickness / 2;
  const steps = chooseStepsPerMetre(line, half);
  const ends = closed ? 'joined' : style;
  if (style === 'square') {
    return fromSteps(thicken(toSteps([line], steps), half * steps, ends, { mitreLimit: MITRE_LIMIT }), steps);
  }
  // The shake of a hand under the width of the arcs' own sagitta changes nothing but the work.
  const steady = toSteps([simplifyPath(line, SAGITTA * half)], steps);
  return fromSteps(paintStroke(steady, half * steps, ends), steps);
}

/** Points of a stroke painted at once. */
const POINTS_PER_STRETCH = 32;

/**
 * A round brush along a line. Stretches are painted apart and joined two by two: where a hand has scribbled over the same
 * place many times, most of the outline is gone before it meets the rest (3000 points of scribble: 0.6 s, not 8 s).
 */
function paintStroke(path: WholePaths, radius: number, ends: LineEnds): WholePaths {
  const [points = []] = path;
  const corners = { arcTolerance: SAGITTA * radius };
  if (points.length <= POINTS_PER_STRETCH) return thicken(path, radius, ends, corners);
  const round = ends === 'joined' ? [...points, ...points.slice(0, 1)] : points;
  let painted: WholePaths[] = [];
  for (let from = 0; from < round.length - 1; from += POINTS_PER_STRETCH - 1) {
    painted.push(thicken([round.slice(from, from + POINTS_PER_STRETCH)], radius, 'round', corners));
  }
  while (painted.length > 1) {
    const pairs = painted;
    painted = [];
    for (let k = 0; k < pairs.length; k += 2) painted.push(unite(pairs[k] ?? [], pairs[k + 1]));
  }
  return painted[0] ?? [];
}

/** One straight piece, exact to rounding. */
function makeBar(a: XY, b: XY, thickness: number): Ring {
  const length = Math.hypot(b[0] - a[0], b[1] - a[1]);
  const nx = (-(b[1] - a[1]) / length) * (thickness / 2);
  const ny = ((b[0] - a[0]) / length) * (thickness / 2);
  return [
    [a[0] - nx, a[1] - ny],
    [b[0] - nx, b[1] - ny],
    [b[0] + nx, b[1] + ny],
    [a[0] + nx, a[1] + ny],
  ];
}
