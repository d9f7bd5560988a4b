// Owns the geometry of a part under way: which fields can be typed, where the next point goes, what part it makes.
// Must not know the DOM, stores, pointers or keys.
import { formatQuantity } from '../../../base/quantity.ts';
import type { Part, PartKind, Point, XY } from '../../../model/job.ts';
import { makePart } from '../../../model/new-job.ts';
import { constrainAngle, polar, roundTo, roundReach, type Snap } from '../snap.ts';
import { snapStep, stepAtLeast, tidyLength } from '../ticks.ts';
import type { ToolContext } from './tool.ts';
import { readTyped, type TypedKind, type TypedState, type TypedValue } from './typed-values.ts';

export interface Draft {
  readonly part: PartKind;
  readonly points: readonly XY[];
  /** Where the pointer (or the arrow keys) stands, snapped. */
  readonly cursor: XY;
  /** What the cursor met; null when it was set by keys. */
  readonly snap: Snap | null;
  readonly typed: TypedState;
  readonly shift: boolean;
}

export interface Field {
  readonly name: string;
  readonly kind: TypedKind;
}

const PLACE: readonly Field[] = [
  { name: 'x', kind: 'length' },
  { name: 'y', kind: 'length' },
];
const SEGMENT: readonly Field[] = [
  { name: 'length', kind: 'length' },
  { name: 'angle', kind: 'angle' },
];

export function isLine(part: PartKind): boolean {
  return part === 'wall' || part === 'polygon' || part === 'stroke';
}

/** What can be typed at this moment. A stroke's width comes first, before its path. */
export function fieldsOf({ part, points }: Pick<Draft, 'part' | 'points'>): readonly Field[] {
  if (part === 'stroke') return [{ name: 'width', kind: 'length' }];
  if (points.length === 0) return PLACE;
  switch (part) {
    case 'wall':
    case 'polygon':
      return SEGMENT;
    case 'rectangle':
      return [
        { name: 'width', kind: 'length' },
        { name: 'height', kind: 'length' },
      ];
    case 'disc':
      return [{ name: 'radius', kind: 'length' }];
    case 'ring':
      return [
        { name: 'outer radius', kind: 'length' },
        { name: 'inner radius', kind: 'length' },
      ];
  }
}

function typedAt(draft: Draft, field: number, context: ToolContext): TypedValue {
  return readTyped(draft.typed, field, fieldsOf(draft)[field]?.kind ?? 'length', context);
}

function valueOr(typed: TypedValue, otherwise: number): number {
  return typed.kind === 'value' ? typed.value : otherwise;
}

/** Fields whose sign says a side; the others are sizes. */
const SIGNED_FIELDS = ['x', 'y', 'angle', 'length', 'height'];

/** The first field that does not read, or makes no shape, in words. */
export function findProblem(draft: Draft, context: ToolContext): string | null {
  const fields = fieldsOf(draft);
  const typed = fields.map((_, k) => typedAt(draft, k, context));
  for (const [k, field] of fields.entries()) {
    const value = typed[k];
    if (value?.kind === 'wrong') return value.message;
    const signed = SIGNED_FIELDS.includes(field.name) || draft.part === 'rectangle';
    if (value?.kind === 'value' && value.value <= 0 && !signed) return `The ${field.name} must be above zero.`;
  }
  const inner = draft.part === 'ring' && draft.points.length > 0 ? typed[1] : undefined;
  if (inner?.kind !== 'value') return null;
  const [from, to] = [draft.points[0] ?? draft.cursor, targetOf(draft, context)];
  const outer = Math.hypot(to[0] - from[0], to[1] - from[1]);
  return inner.value < outer ? null : `The inner radius must be below the outer one, ${formatQuantity(outer, 'length', 4)}.`;
}

/** Where the next point goes: the cursor, unless typed values or Shift say otherwise. */
export function targetOf(draft: Draft, context: ToolContext): XY {
  const { part, points, cursor } = draft;
  const last = points.at(-1);
  if (part === 'stroke') return cursor;
  if (last === undefined) {
    return [valueOr(typedAt(draft, 0, context), cursor[0]), valueOr(typedAt(draft, 1, context), cursor[1])];
  }
  switch (part) {
    case 'wall':
    case 'polygon':
      return segmentEnd(draft, last, context);
    case 'rectangle':
      return oppositeCorner(draft, last, context);
    case 'disc':
    case 'ring': {
      const typed = typedAt(draft, 0, context);
      const angle = Math.atan2(cursor[1] - last[1], cursor[0] - last[0]);
      if (typed.kind === 'value') return polar(last, typed.value, angle);
      return draft.snap?.kind === 'point' ? cursor : roundReach(last, cursor, snapStep(context.pixelsPerMetre));
    }
  }
}

const ONE_DEGREE = Math.PI / 180;

/** A typed length keeps the pointer's direction, to the whole degree; a typed angle keeps the pointer's distance along it. */
function segmentEnd(draft: Draft, last: XY, context: ToolContext): XY {
  const step = snapStep(context.pixelsPerMetre);
  const [length, angle] = [typedAt(draft, 0, context), typedAt(draft, 1, context)];
  const aim = draft.shift && angle.kind !== 'value' ? constrainAngle(last, draft.cursor, step) : draft.cursor;
  const [dx, dy] = [aim[0] - last[0], aim[1] - last[1]];
  if (angle.kind === 'value') {
    const along = roundTo(dx * Math.cos(angle.value) + dy * Math.sin(angle.value), step);
    return polar(last, valueOr(length, along), angle.value);
  }
  if (length.kind !== 'value') return aim;
  return polar(last, length.value, roundTo(Math.atan2(dy, dx), ONE_DEGREE));
}

/** Typed sizes go to the side on which the pointer is; Shift makes a square of the larger side. */
function oppositeCorner(draft: Draft, from: XY, context: ToolContext): XY {
  let [dx, dy] = [draft.cursor[0] - from[0], draft.cursor[1] - from[1]];
  const sign = (v: number): 1 | -1 => (v < 0 ? -1 : 1);
  if (draft.shift) {
    const side = Math.max(Math.abs(dx), Math.abs(dy));
    [dx, dy] = [sign(dx) * side, sign(dy) * side];
  }
  const [width, height] = [typedAt(draft, 0, context), typedAt(draft, 1, context)];
  return [
    from[0] + (width.kind === 'value' ? sign(dx) * width.value : dx),
    from[1] + (height.kind === 'value' ? sign(dy) * height.value : dy),
  ];
}

/** The values as they stand, for the box at the cursor. */
export function liveValues(draft: Draft, context: ToolContext): readonly string[] {
  const target = targetOf(draft, context);
  const last = draft.points.at(-1);
  if (draft.part === 'stroke') return [strokeWidth(draft, context)];
  if (last === undefined) return [tidyLength(target[0]), tidyLength(target[1])];
  const [dx, dy] = [target[0] - last[0], target[1] - last[1]];
  const reach = Math.hypot(dx, dy);
  switch (draft.part) {
    case 'wall':
    case 'polygon':
      return [formatQuantity(reach, 'length', 5), formatQuantity(Math.atan2(dy, dx), 'angle', 4)];
    case 'rectangle':
      return [tidyLength(Math.abs(dx)), tidyLength(Math.abs(dy))];
    case 'disc':
      return [formatQuantity(reach, 'length', 5)];
    case 'ring':
      return [formatQuantity(reach, 'length', 5), ringInner(draft, reach, context)];
  }
}

function tidyPoint(at: XY): Point {
  return [tidyLength(at[0]), tidyLength(at[1])];
}

/** A typed radius is kept as it was typed: "a/2" stays "a/2". */
function radiusText(draft: Draft, reach: number, context: ToolContext): string {
  const typed = typedAt(draft, 0, context);
  return typed.kind === 'value' ? typed.text : tidyLength(Number(reach.toPrecision(5)));
}

function ringInner(draft: Draft, outerMetres: number, context: ToolContext): string {
  const typed = typedAt(draft, 1, context);
  return typed.kind === 'value' ? typed.text : tidyLength(Number((outerMetres / 2).toPrecision(4)));
}

/** Unless typed, about twelve pixels of the present scale, so that a person sees what they paint. */
export function strokeWidth(draft: Draft, context: ToolContext): string {
  const typed = typedAt(draft, 0, context);
  return typed.kind === 'value' ? typed.text : tidyLength(stepAtLeast(12 / context.pixelsPerMetre));
}

/** A new wall is as thick as a thin line of the drawing: six pixels or more, on a round step. */
function wallThickness(context: ToolContext): string {
  return tidyLength(stepAtLeast(6 / context.pixelsPerMetre));
}

/** The part that these points make, or null while they make none. */
export function partOf(draft: Draft, points: readonly XY[], context: ToolContext): Part | null {
  const path = points.filter((at, k) => k === 0 || !samePlace(at, points[k - 1] ?? at));
  const [from, to] = [path[0], path.at(-1)];
  if (from === undefined || to === undefined) return null;
  const { job, paint } = context;
  const reach = Math.hypot(to[0] - from[0], to[1] - from[1]);
  switch (draft.part) {
    case 'wall':
      if (path.length < 2) return null;
      return makePart(job, 'wall', paint, { points: path.map(tidyPoint), thickness: wallThickness(context) });
    case 'polygon':
      return path.length < 3 ? null : makePart(job, 'polygon', paint, { points: path.map(tidyPoint) });
    case 'stroke':
      return makePart(job, 'stroke', paint, { points: path.map(tidyPoint), width: strokeWidth(draft, context) });
    case 'rectangle':
      if (from[0] === to[0] || from[1] === to[1]) return null;
      return makePart(job, 'rectangle', paint, { from: tidyPoint(from), to: tidyPoint(to) });
    case 'disc':
      if (reach === 0) return null;
      return makePart(job, 'disc', paint, { centre: tidyPoint(from), radius: radiusText(draft, reach, context) });
    case 'ring': {
      if (reach === 0) return null;
      const [inner, outer] = [ringInner(draft, reach, context), radiusText(draft, reach, context)];
      return makePart(job, 'ring', paint, { centre: tidyPoint(from), inner, outer, from: '0 deg', to: '360 deg' });
    }
  }
}

export function samePlace(p: XY, q: XY): boolean {
  return tidyLength(p[0]) === tidyLength(q[0]) && tidyLength(p[1]) === tidyLength(q[1]);
}
