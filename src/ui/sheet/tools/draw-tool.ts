// Owns drawing a new part: points set by pointer, by typed sizes or by arrow keys, until the part is done.
// Must not know the DOM, stores, or how things are drawn.
import type { PartKind, XY } from '../../../model/job.ts';
import { makeSnapTargets, roundTo, snapTo } from '../snap.ts';
import { snapStep } from '../ticks.ts';
import { fieldsOf, findProblem, isLine, liveValues, partOf, samePlace, targetOf, type Draft } from './draft.ts';
import { simplifyPath } from '../../../model/simplify-path.ts';
import { arrowShift, RECORD, type ToolAction, type ToolContext, type ToolInput, type ToolStep, type TypedBox } from './tool.ts';
import { isTyping, NOTHING_TYPED, typeKey } from './typed-values.ts';

/** A press and release further apart than this is a drag, which sets both ends of a shape. */
const DRAG_PIXELS = 5;

/** Freehand paths are thinned to this. */
const STROKE_TOLERANCE_PIXELS = 1;

export interface DrawState extends Draft {
  readonly kind: 'draw';
  /** Where the button went down, while it is down. */
  readonly pressedAt: XY | null;
  /** True once arrow keys have moved the cursor: Enter then sets a point there. */
  readonly byKeys: boolean;
}

type Step = ToolStep<DrawState>;
type Pointer = Extract<ToolInput, { at: XY }>;
type Key = Extract<ToolInput, { kind: 'key' }>;

export function startDrawing(part: PartKind, at: XY): DrawState {
  return {
    kind: 'draw',
    part,
    points: [],
    cursor: at,
    typed: NOTHING_TYPED,
    shift: false,
    snap: null,
    pressedAt: null,
    byKeys: false,
  };
}

export function reduceDraw(state: DrawState, input: ToolInput, context: ToolContext): Step {
  if (input.kind === 'key') return reduceKey(state, input, context);
  const aimed = aim(state, input, context);
  switch (input.kind) {
    case 'press':
      return press({ ...aimed, pressedAt: input.at }, context);
    case 'move':
      return show(scribble(aimed, context), context);
    case 'release':
      return release(aimed, input, context);
    case 'double':
      return isLine(state.part) ? finish(state, state.points, context) : show(aimed, context);
  }
}

function aim(state: DrawState, input: Pointer, context: ToolContext): DrawState {
  const freehand = state.part === 'stroke' && state.pressedAt !== null;
  const snap = snapTo(input.at, makeSnapTargets(context.resolved), context.pixelsPerMetre, input.alt || freehand);
  return { ...state, cursor: snap.at, snap, shift: input.shift, byKeys: false };
}

/** While the button is down a stroke gathers its path. */
function scribble(state: DrawState, context: ToolContext): DrawState {
  if (state.part !== 'stroke' || state.pressedAt === null) return state;
  const last = state.points.at(-1);
  const near =
    last !== undefined && Math.hypot(last[0] - state.cursor[0], last[1] - state.cursor[1]) * context.pixelsPerMetre < 0.75;
  return near ? state : { ...state, points: [...state.points, state.cursor] };
}

function press(state: DrawState, context: ToolContext): Step {
  if (findProblem(state, context) !== null) return show(state, context);
  return setPoint(state, context);
}

/** Sets the next point; a shape is done with its second. */
function setPoint(state: DrawState, context: ToolContext): Step {
  const target = targetOf(state, context);
  const last = state.points.at(-1);
  if (last !== undefined && samePlace(last, target)) return show(state, context);
  const points = [...state.points, target];
  if (points.length > 1 && !isLine(state.part)) return finish(state, points, context);
  const first = points[0];
  const closes = state.part === 'polygon' && points.length > 3 && first !== undefined && samePlace(first, target);
  if (closes) return finish(state, state.points, context);
  const typed = state.part === 'stroke' ? state.typed : NOTHING_TYPED;
  return show({ ...state, points, typed, cursor: target, byKeys: false }, context);
}

function release(state: DrawState, input: Pointer, context: ToolContext): Step {
  const { pressedAt } = state;
  const released: DrawState = { ...state, pressedAt: null };
  if (pressedAt === null) return show(released, context);
  if (state.part === 'stroke') {
    return finish(released, simplifyPath(state.points, STROKE_TOLERANCE_PIXELS / context.pixelsPerMetre), context);
  }
  const gone = Math.hypot(input.at[0] - pressedAt[0], input.at[1] - pressedAt[1]) * context.pixelsPerMetre;
  const dragged = gone > DRAG_PIXELS && state.points.length === 1 && findProblem(state, context) === null;
  return dragged ? setPoint(released, context) : show(released, context);
}

function reduceKey(state: DrawState, input: Key, context: ToolContext): Step {
  if (input.key === 'Shift') return show({ ...state, shift: true }, context);
  if (input.ctrl) return show(state, context, { handled: false });
  if (input.key === 'Escape') return escape(state, context);
  if (input.key === 'Enter') return enter(state, context);
  const shift = arrowShift(input.key, input.shift, snapStep(context.pixelsPerMetre));
  if (shift !== null) return show(moveByKeys(state, shift, context), context);
  const typed = typeKey(state.typed, input.key, input.shift, fieldsOf(state).length);
  if (typed !== null) return show({ ...state, typed }, context);
  if (input.key === 'Backspace' && state.points.length > 0) return show({ ...state, points: state.points.slice(0, -1) }, context);
  return show(state, context, { handled: false });
}

function moveByKeys(state: DrawState, [dx, dy]: XY, context: ToolContext): DrawState {
  const step = snapStep(context.pixelsPerMetre);
  const cursor: XY = [roundTo(state.cursor[0] + dx, step), roundTo(state.cursor[1] + dy, step)];
  return { ...state, cursor, snap: null, byKeys: true };
}

/** Takes typed text back first; then ends: a line that is long enough stays, anything else is dropped. */
function escape(state: DrawState, context: ToolContext): Step {
  if (isTyping(state.typed) && state.part !== 'stroke') return show({ ...state, typed: NOTHING_TYPED }, context);
  return finish(state, isLine(state.part) ? state.points : [], context);
}

/** Sets the point that is typed or that the arrow keys have reached; otherwise ends the line, or sets the shape's corner. */
function enter(state: DrawState, context: ToolContext): Step {
  if (findProblem(state, context) !== null) return show(state, context);
  const typing = isTyping(state.typed) && state.part !== 'stroke';
  if (typing || state.byKeys || !isLine(state.part)) return setPoint(state, context);
  return state.points.length > 0 ? finish(state, state.points, context) : setPoint(state, context);
}

/** Adds what was drawn, if it is anything, and goes back to selecting. */
function finish(state: DrawState, points: readonly XY[], context: ToolContext): Step {
  const item = partOf(state, points, context);
  const back: ToolAction = { do: 'take', tool: { kind: 'select' } };
  const rest = startDrawing(state.part, state.cursor);
  if (item === null) return bare(rest, [back]);
  return bare(rest, [
    { do: 'edit', command: { do: 'add', list: 'parts', item }, policy: RECORD },
    { do: 'select', ids: [item.id] },
    back,
  ]);
}

function bare(state: DrawState, commands: readonly ToolAction[]): Step {
  return { state, commands, cursor: 'crosshair', preview: null, typed: null, snap: null, handled: true };
}

function show(state: DrawState, context: ToolContext, extra: Partial<Step> = {}): Step {
  const target = targetOf(state, context);
  const freehand = state.part === 'stroke' && state.pressedAt !== null;
  const points = freehand ? state.points : [...state.points, target];
  return {
    ...bare(state, []),
    preview: { kind: 'part', part: partOf(state, points, context), points },
    typed: makeTypedBox(state, target, context),
    snap: isTyping(state.typed) && state.part !== 'stroke' ? null : state.snap,
    ...extra,
  };
}

function makeTypedBox(state: DrawState, at: XY, context: ToolContext): TypedBox {
  const live = liveValues(state, context);
  return {
    at,
    fields: fieldsOf(state).map((field, k) => ({ name: field.name, text: state.typed.texts[k] ?? '', live: live[k] ?? '' })),
    active: state.typed.active,
    problem: findProblem(state, context),
  };
}
