// Owns the ring and the ring sector.
// Must not know other kinds, the grid, or how parts look on screen.
import { retargetQuantity } from '../../base/edit-quantity.ts';
import type { NamedValues } from '../../base/quantity.ts';
import { formatQuantity } from '../../base/quantity.ts';
import type { Outline, RingPart, XY } from '../job.ts';
import { makeArc, makeCircle } from '../outline.ts';
import { makePartKind } from './part-kind.ts';
import { movePoint, putPoint } from './points.ts';

interface RingShape {
  readonly centre: XY;
  readonly inner: number;
  readonly outer: number;
  readonly from: number;
  readonly to: number;
}

const WHOLE = 2 * Math.PI;
/** Angles typed as 360 deg differ from two pi by rounding only. */
const ANGLE_SLACK = 1e-9;

/** Angle swept counter-clockwise, above 0 and at most two pi. */
function sweep({ from, to }: RingShape): number {
  const turn = to - from;
  if (turn >= WHOLE - ANGLE_SLACK) return WHOLE;
  return turn > 0 ? turn : turn + WHOLE * Math.ceil(-turn / WHOLE + ANGLE_SLACK);
}

function onCircle(centre: XY, radius: number, angle: number): XY {
  return [centre[0] + radius * Math.cos(angle), centre[1] + radius * Math.sin(angle)];
}

function drawRing(shape: RingShape): Outline {
  const { centre, inner, outer, from } = shape;
  const turn = sweep(shape);
  if (turn === WHOLE) {
    const outside = makeCircle(centre, outer);
    return inner > 0 ? [outside, makeCircle(centre, inner).toReversed()] : [outside];
  }
  const outside = makeArc(centre, outer, from, from + turn);
  return [inner > 0 ? [...outside, ...makeArc(centre, inner, from, from + turn).toReversed()] : [...outside, centre]];
}

function dragRing(part: RingPart, shape: RingShape, handle: string, at: XY, values: NamedValues): RingPart {
  if (handle === 'centre') return { ...part, centre: putPoint(part.centre, at, values) };
  const reach = Math.hypot(at[0] - shape.centre[0], at[1] - shape.centre[1]);
  if (reach === 0) return part;
  if (handle === 'inner' || handle === 'outer') {
    const allowed = handle === 'inner' ? reach < shape.outer : reach > shape.inner;
    return allowed ? { ...part, [handle]: retargetQuantity(part[handle], reach, 'length', values) } : part;
  }
  if (handle !== 'from' && handle !== 'to') return part;
  const angle = Math.atan2(at[1] - shape.centre[1], at[0] - shape.centre[0]);
  const now = shape[handle];
  // The nearest turn: dragging past the x axis must not jump by a whole circle.
  const near = angle + WHOLE * Math.round((now - angle) / WHOLE);
  // Past a whole turn the ring is closed.
  const held = handle === 'to' ? Math.min(near, shape.from + WHOLE) : Math.max(near, shape.to - WHOLE);
  return { ...part, [handle]: retargetQuantity(part[handle], held, 'angle', values) };
}

export const ringKind = makePartKind<RingPart, RingShape>({
  kind: 'ring',
  label: 'ring sector',
  readShape: (part, reader, path) => ({
    centre: reader.point(part.centre, `${path}centre`),
    inner: reader.read(part.inner, 'length', `${path}inner`, 'depth'),
    outer: reader.read(part.outer, 'length', `${path}outer`, 'size'),
    from: reader.read(part.from, 'angle', `${path}from`),
    to: reader.read(part.to, 'angle', `${path}to`),
  }),
  findFault: ({ inner, outer }, path) =>
    inner < outer
      ? null
      : {
          code: 'shape',
          path: `${path}inner`,
          message: `The inner radius ${formatQuantity(inner, 'length')} is not below the outer radius ${formatQuantity(outer, 'length')}.`,
          hint: 'Make the inner radius smaller or the outer one larger.',
        },
  outline: drawRing,
  smallestMetres: ({ inner, outer }) => (inner > 0 ? outer - inner : outer),
  handles: (shape) => {
    const middle = shape.from + sweep(shape) / 2;
    const handles = [
      { name: 'centre', at: shape.centre },
      { name: 'inner', at: onCircle(shape.centre, shape.inner, middle) },
      { name: 'outer', at: onCircle(shape.centre, shape.outer, middle) },
      { name: 'from', at: onCircle(shape.centre, shape.outer, shape.from) },
      { name: 'to', at: onCircle(shape.centre, shape.outer, shape.to) },
    ];
    return sweep(shape) === WHOLE ? handles.slice(0, 3) : handles;
  },
  drag: dragRing,
  move: (part, dx, dy) => ({ ...part, centre: movePoint(part.centre, dx, dy) }),
  dimensions: ({ centre, inner, outer, from, to }) => [
    { name: 'inner', from: centre, to: onCircle(centre, inner, from), value: inner, dimension: 'length', path: 'inner' },
    { name: 'outer', from: centre, to: onCircle(centre, outer, to), value: outer, dimension: 'length', path: 'outer' },
    { name: 'from', from: centre, to: onCircle(centre, outer, from), value: from, dimension: 'angle', path: 'from' },
    { name: 'to', from: centre, to: onCircle(centre, outer, to), value: to, dimension: 'angle', path: 'to' },
  ],
  setDimension: (part, _shape, name, text) => ({ ...part, [name]: text }),
  sentence: () => [
    { text: ' is ' },
    { path: ['material'], as: 'material' },
    { text: ', a ring sector about ' },
    { path: ['centre'], as: 'point' },
    { text: ', radius ' },
    { path: ['inner'], as: 'length' },
    { text: ' to ' },
    { path: ['outer'], as: 'length' },
    { text: ', from ' },
    { path: ['from'], as: 'angle' },
    { text: ' to ' },
    { path: ['to'], as: 'angle' },
    { text: ' counter-clockwise.' },
  ],
});
