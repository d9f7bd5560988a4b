// Owns what kinds made of a list of points share: moving, dragging and measuring them.
// Must not know any kind in particular.
import { retargetQuantity, shiftQuantity } from '../../base/edit-quantity.ts';
import type { NamedValues } from '../../base/quantity.ts';
import type { AppError } from '../../base/result.ts';
import type { Point, XY } from '../job.ts';
import type { NumberReader } from '../number-reader.ts';
import { countCrossings } from '../outline.ts';
import type { Handle, PartDimension } from './part-kind.ts';

/** More handles or measures than this hide the drawing. */
const MOST_SHOWN = 40;

export function movePoint(point: Point, dxMetres: number, dyMetres: number): Point {
  return [shiftQuantity(point[0], dxMetres, 'length'), shiftQuantity(point[1], dyMetres, 'length')];
}

export function putPoint(point: Point, at: XY, values: NamedValues): Point {
  return [retargetQuantity(point[0], at[0], 'length', values), retargetQuantity(point[1], at[1], 'length', values)];
}

export function movePoints(points: readonly Point[], dxMetres: number, dyMetres: number): readonly Point[] {
  return points.map((point) => movePoint(point, dxMetres, dyMetres));
}

export function readPoints(points: readonly Point[], reader: NumberReader, path: string): XY[] {
  return points.map((point, k) => reader.point(point, `${path}points[${k}]`));
}

/** A line may cross itself this often; uniting its outline then takes about half a second. */
const MOST_CROSSINGS = 2000;

export function findTangle(points: readonly XY[], path: string): AppError | null {
  if (countCrossings(points, MOST_CROSSINGS) <= MOST_CROSSINGS) return null;
  return {
    code: 'shape',
    path: `${path}points`,
    message: `The line crosses itself more than ${MOST_CROSSINGS} times.`,
    hint: 'Draw it as several parts, or with fewer points.',
  };
}

export function pointHandles(points: readonly XY[]): readonly Handle[] {
  const handles = points.map((at, k): Handle => ({ name: `point ${k}`, at }));
  if (handles.length <= MOST_SHOWN) return handles;
  return handles.filter((_, k) => k === 0 || k === handles.length - 1);
}

/** Points with the one the handle names put elsewhere; unchanged for other handles. */
export function dragPoint(points: readonly Point[], handle: string, at: XY, values: NamedValues): readonly Point[] {
  return points.map((point, k) => (handle === `point ${k}` ? putPoint(point, at, values) : point));
}

export function lengthDimensions(points: readonly XY[], closed: boolean): readonly PartDimension[] {
  if (points.length > MOST_SHOWN) return [];
  const count = closed ? points.length : points.length - 1;
  return Array.from({ length: Math.max(0, count) }, (_, k): PartDimension => {
    const from = points[k] ?? [0, 0];
    const next = (k + 1) % points.length;
    const to = points[next] ?? [0, 0];
    const value = Math.hypot(to[0] - from[0], to[1] - from[1]);
    return { name: `side ${k}`, from, to, value, dimension: 'length', path: `points[${next}]` };
  });
}

/**
 * Makes a side as long as wanted by moving its far end along it, and all points after that by as much, so that the rest
 * keeps its form. The side that closes a ring moves its near end.
 */
export function setSideLength(points: readonly Point[], metres: readonly XY[], name: string, value: number): readonly Point[] {
  const side = Number(name.slice('side '.length));
  const from = metres[side];
  const to = metres[(side + 1) % metres.length];
  if (from === undefined || to === undefined) return points;
  const now = Math.hypot(to[0] - from[0], to[1] - from[1]);
  if (now === 0) return points;
  const [dx, dy] = [((to[0] - from[0]) / now) * (value - now), ((to[1] - from[1]) / now) * (value - now)];
  if (side === metres.length - 1) return points.map((point, k) => (k === side ? movePoint(point, -dx, -dy) : point));
  return points.map((point, k) => (k > side ? movePoint(point, dx, dy) : point));
}

/** Where a line's thickness is measured: the middle of its first piece, and the unit normal there. */
function middleOfFirstPiece(points: readonly XY[]): { at: XY; normal: XY } {
  const a = points[0] ?? [0, 0];
  const b = points.find((p) => p[0] !== a[0] || p[1] !== a[1]) ?? [a[0] + 1, a[1]];
  const length = Math.hypot(b[0] - a[0], b[1] - a[1]);
  const at: XY = points.length < 2 ? a : [(a[0] + b[0]) / 2, (a[1] + b[1]) / 2];
  return { at, normal: [-(b[1] - a[1]) / length, (b[0] - a[0]) / length] };
}

export function thicknessDimension(name: string, points: readonly XY[], thickness: number): PartDimension {
  const { at, normal } = middleOfFirstPiece(points);
  const half = thickness / 2;
  return {
    name,
    from: [at[0] - normal[0] * half, at[1] - normal[1] * half],
    to: [at[0] + normal[0] * half, at[1] + normal[1] * half],
    value: thickness,
    dimension: 'length',
    path: name,
  };
}

/** Thickness that puts the edge of the first piece under (x, y). */
export function thicknessThrough(points: readonly XY[], at: XY): number {
  const middle = middleOfFirstPiece(points);
  const reach = (at[0] - middle.at[0]) * middle.normal[0] + (at[1] - middle.at[1]) * middle.normal[1];
  return 2 * Math.abs(reach);
}
