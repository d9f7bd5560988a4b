// Owns the polygon: a closed ring of points; where it crosses itself the lobes are joined.
// Must not know other kinds, the grid, or how parts look on screen.
import type { PolygonPart, XY } from '../job.ts';
import { makeRingOutline, outlineBounds } from '../outline.ts';
import { makePartKind } from './part-kind.ts';
import { dragPoint, findTangle, lengthDimensions, movePoints, pointHandles, readPoints, setSideLength } from './points.ts';

interface PolygonShape {
  readonly points: readonly XY[];
}

export const polygonKind = makePartKind<PolygonPart, PolygonShape>({
  kind: 'polygon',
  label: 'polygon',
  readShape: (part, reader, path) => ({ points: readPoints(part.points, reader, path) }),
  findFault: (shape, path) => findTangle(shape.points, path),
  outline: (shape) => makeRingOutline(shape.points),
  smallestMetres: (shape) => {
    const { left, right, bottom, top } = outlineBounds([shape.points]);
    return Math.min(right - left, top - bottom);
  },
  handles: (shape) => pointHandles(shape.points),
  drag: (part, _shape, handle, at, values) => ({ ...part, points: dragPoint(part.points, handle, at, values) }),
  move: (part, dx, dy) => ({ ...part, points: movePoints(part.points, dx, dy) }),
  dimensions: (shape) => lengthDimensions(shape.points, true),
  setDimension: (part, shape, name, _text, value) => ({ ...part, points: setSideLength(part.points, shape.points, name, value) }),
  sentence: (part) => [
    { text: ' is ' },
    { path: ['material'], as: 'material' },
    { text: `, a polygon of ${part.points.length} points from ` },
    { path: ['points', 0], as: 'point' },
    { text: '.' },
  ],
});
