// Owns the wall: a line with a thickness, ends cut square, corners mitred.
// Must not know other kinds, the grid, or how parts look on screen.
import { retargetQuantity } from '../../base/edit-quantity.ts';
import type { WallPart, XY } from '../job.ts';
import { makeLineOutline } from '../outline.ts';
import type { Phrase } from './part-kind.ts';
import { makePartKind } from './part-kind.ts';
import {
  dragPoint,
  findTangle,
  lengthDimensions,
  movePoints,
  pointHandles,
  readPoints,
  setSideLength,
  thicknessDimension,
  thicknessThrough,
} from './points.ts';

interface WallShape {
  readonly points: readonly XY[];
  readonly thickness: number;
}

function describePoints(count: number): readonly Phrase[] {
  const last = count - 1;
  const between = count === 2 ? ' to ' : ` through ${count - 2} ${count === 3 ? 'point' : 'points'} to `;
  return [{ path: ['points', 0], as: 'point' }, { text: between }, { path: ['points', last], as: 'point' }];
}

export const wallKind = makePartKind<WallPart, WallShape>({
  kind: 'wall',
  label: 'wall',
  readShape: (part, reader, path) => ({
    points: readPoints(part.points, reader, path),
    thickness: reader.read(part.thickness, 'length', `${path}thickness`, 'size'),
  }),
  findFault: (shape, path) => findTangle(shape.points, path),
  outline: (shape) => makeLineOutline(shape.points, shape.thickness, 'square'),
  smallestMetres: (shape) => shape.thickness,
  handles: (shape) => [
    ...pointHandles(shape.points),
    { name: 'thickness', at: thicknessDimension('thickness', shape.points, shape.thickness).to },
  ],
  drag: (part, shape, handle, at, values) => {
    if (handle !== 'thickness') return { ...part, points: dragPoint(part.points, handle, at, values) };
    const thickness = thicknessThrough(shape.points, at);
    return thickness > 0 ? { ...part, thickness: retargetQuantity(part.thickness, thickness, 'length', values) } : part;
  },
  move: (part, dx, dy) => ({ ...part, points: movePoints(part.points, dx, dy) }),
  dimensions: (shape) => [
    thicknessDimension('thickness', shape.points, shape.thickness),
    ...lengthDimensions(shape.points, false),
  ],
  setDimension: (part, shape, name, text, value) =>
    name === 'thickness'
      ? { ...part, thickness: text }
      : { ...part, points: setSideLength(part.points, shape.points, name, value) },
  sentence: (part) => [
    { text: ' is ' },
    { path: ['material'], as: 'material' },
    { text: ', ' },
    { path: ['thickness'], as: 'length' },
    { text: ' thick, from ' },
    ...describePoints(part.points.length),
    { text: '.' },
  ],
});
