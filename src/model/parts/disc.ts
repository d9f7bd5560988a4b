// Owns the disc.
// Must not know other kinds, the grid, or how parts look on screen.
import { retargetQuantity } from '../../base/edit-quantity.ts';
import type { DiscPart, XY } from '../job.ts';
import { makeCircle } from '../outline.ts';
import { makePartKind } from './part-kind.ts';
import { movePoint, putPoint } from './points.ts';

interface DiscShape {
  readonly centre: XY;
  readonly radius: number;
}

export const discKind = makePartKind<DiscPart, DiscShape>({
  kind: 'disc',
  label: 'disc',
  readShape: (part, reader, path) => ({
    centre: reader.point(part.centre, `${path}centre`),
    radius: reader.read(part.radius, 'length', `${path}radius`, 'size'),
  }),
  findFault: () => null,
  outline: (shape) => [makeCircle(shape.centre, shape.radius)],
  smallestMetres: (shape) => 2 * shape.radius,
  handles: ({ centre, radius }) => [
    { name: 'centre', at: centre },
    { name: 'radius', at: [centre[0] + radius, centre[1]] },
  ],
  drag: (part, shape, handle, at, values) => {
    if (handle === 'centre') return { ...part, centre: putPoint(part.centre, at, values) };
    const radius = Math.hypot(at[0] - shape.centre[0], at[1] - shape.centre[1]);
    if (handle !== 'radius' || radius === 0) return part;
    return { ...part, radius: retargetQuantity(part.radius, radius, 'length', values) };
  },
  move: (part, dx, dy) => ({ ...part, centre: movePoint(part.centre, dx, dy) }),
  dimensions: ({ centre, radius }) => [
    { name: 'radius', from: centre, to: [centre[0] + radius, centre[1]], value: radius, dimension: 'length', path: 'radius' },
  ],
  setDimension: (part, _shape, _name, text) => ({ ...part, radius: text }),
  sentence: () => [
    { text: ' is ' },
    { path: ['material'], as: 'material' },
    { text: ', a disc of radius ' },
    { path: ['radius'], as: 'length' },
    { text: ' about ' },
    { path: ['centre'], as: 'point' },
    { text: '.' },
  ],
});
