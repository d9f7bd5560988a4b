// Owns the stroke: a freehand path painted with a round brush.
// Must not know other kinds, the grid, or how parts look on screen.
import { retargetQuantity } from '../../base/edit-quantity.ts';
import type { StrokePart, XY } from '../job.ts';
import { makeLineOutline } from '../outline.ts';
import { makePartKind } from './part-kind.ts';
import { dragPoint, findTangle, movePoints, pointHandles, readPoints, thicknessDimension, thicknessThrough } from './points.ts';

interface StrokeShape {
  readonly points: readonly XY[];
  readonly width: number;
}

export const strokeKind = makePartKind<StrokePart, StrokeShape>({
  kind: 'stroke',
  label: 'stroke',
  readShape: (part, reader, path) => ({
    points: readPoints(part.points, reader, path),
    width: reader.read(part.width, 'length', `${path}width`, 'size'),
  }),
  findFault: (shape, path) => findTangle(shape.points, path),
  outline: (shape) => makeLineOutline(shape.points, shape.width, 'round'),
  smallestMetres: (shape) => shape.width,
  handles: (shape) => [
    ...pointHandles(shape.points),
    { name: 'width', at: thicknessDimension('width', shape.points, shape.width).to },
  ],
  drag: (part, shape, handle, at, values) => {
    if (handle !== 'width') return { ...part, points: dragPoint(part.points, handle, at, values) };
    const width = thicknessThrough(shape.points, at);
    return width > 0 ? { ...part, width: retargetQuantity(part.width, width, 'length', values) } : part;
  },
  move: (part, dx, dy) => ({ ...part, points: movePoints(part.points, dx, dy) }),
  dimensions: (shape) => [thicknessDimension('width', shape.points, shape.width)],
  setDimension: (part, _shape, _name, text) => ({ ...part, width: text }),
  sentence: (part) => [
    { text: ' is painted in ' },
    { path: ['material'], as: 'material' },
    { text: ', ' },
    { path: ['width'], as: 'length' },
    { text: ` wide, along ${part.points.length} ${part.points.length === 1 ? 'point' : 'points'} from ` },
    { path: ['points', 0], as: 'point' },
    { text: '.' },
  ],
});
