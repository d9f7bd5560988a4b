// Owns the rectangle: two opposite corners, sides along the axes.
// Must not know other kinds, the grid, or how parts look on screen.
import { retargetQuantity } from '../../base/edit-quantity.ts';
import type { NamedValues } from '../../base/quantity.ts';
import type { Point, RectanglePart, XY } from '../job.ts';
import type { Handle } from './part-kind.ts';
import { makePartKind, offsetCoordinate } from './part-kind.ts';
import { movePoint } from './points.ts';

interface RectangleShape {
  readonly from: XY;
  readonly to: XY;
}

function listHandles({ from, to }: RectangleShape): readonly Handle[] {
  const [left, right] = [Math.min(from[0], to[0]), Math.max(from[0], to[0])];
  const [bottom, top] = [Math.min(from[1], to[1]), Math.max(from[1], to[1])];
  const [middle, centre] = [(bottom + top) / 2, (left + right) / 2];
  return [
    { name: 'left bottom', at: [left, bottom] },
    { name: 'right bottom', at: [right, bottom] },
    { name: 'right top', at: [right, top] },
    { name: 'left top', at: [left, top] },
    { name: 'left', at: [left, middle] },
    { name: 'right', at: [right, middle] },
    { name: 'bottom', at: [centre, bottom] },
    { name: 'top', at: [centre, top] },
  ];
}

/** Moves the sides the handle names; the other two stay. */
function dragSides(part: RectanglePart, shape: RectangleShape, handle: string, at: XY, values: NamedValues): RectanglePart {
  const corners: { from: [string, string]; to: [string, string] } = { from: [...part.from], to: [...part.to] };
  const place = (axis: 0 | 1, upper: boolean): void => {
    const corner = shape.from[axis] > shape.to[axis] === upper ? 'from' : 'to';
    corners[corner][axis] = retargetQuantity(corners[corner][axis], at[axis], 'length', values);
  };
  const words = handle.split(' ');
  if (words.includes('left')) place(0, false);
  if (words.includes('right')) place(0, true);
  if (words.includes('bottom')) place(1, false);
  if (words.includes('top')) place(1, true);
  return { ...part, ...corners };
}

export const rectangleKind = makePartKind<RectanglePart, RectangleShape>({
  kind: 'rectangle',
  label: 'rectangle',
  readShape: (part, reader, path) => ({ from: reader.point(part.from, `${path}from`), to: reader.point(part.to, `${path}to`) }),
  findFault: () => null,
  outline: ({ from, to }) => {
    const [left, right] = [Math.min(from[0], to[0]), Math.max(from[0], to[0])];
    const [bottom, top] = [Math.min(from[1], to[1]), Math.max(from[1], to[1])];
    if (left === right || bottom === top) return [];
    return [
      [
        [left, bottom],
        [right, bottom],
        [right, top],
        [left, top],
      ],
    ];
  },
  smallestMetres: ({ from, to }) => Math.min(Math.abs(to[0] - from[0]), Math.abs(to[1] - from[1])),
  handles: listHandles,
  drag: dragSides,
  move: (part, dx, dy) => ({ ...part, from: movePoint(part.from, dx, dy), to: movePoint(part.to, dx, dy) }),
  dimensions: ({ from, to }) => [
    {
      name: 'width',
      from: [from[0], from[1]],
      to: [to[0], from[1]],
      value: Math.abs(to[0] - from[0]),
      dimension: 'length',
      path: 'to[0]',
    },
    {
      name: 'height',
      from: [from[0], from[1]],
      to: [from[0], to[1]],
      value: Math.abs(to[1] - from[1]),
      dimension: 'length',
      path: 'to[1]',
    },
  ],
  setDimension: (part, shape, name, text) => {
    const to: Point =
      name === 'width'
        ? [offsetCoordinate(part.from[0], text, shape.from[0], shape.to[0]), part.to[1]]
        : [part.to[0], offsetCoordinate(part.from[1], text, shape.from[1], shape.to[1])];
    return { ...part, to };
  },
  sentence: () => [
    { text: ' is ' },
    { path: ['material'], as: 'material' },
    { text: ', a rectangle from ' },
    { path: ['from'], as: 'point' },
    { text: ' to ' },
    { path: ['to'], as: 'point' },
    { text: '.' },
  ],
});
