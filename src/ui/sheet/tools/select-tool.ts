// Owns selecting, moving, resizing, ordering, duplicating and removing things on the sheet.
// Must not know the DOM, stores, or how things are drawn.
import type { Part, XY } from '../../../model/job.ts';
import { dragHandle, listHandles } from '../../../model/parts/registry.ts';
import { makeSnapTargets, polar, roundReach, roundTo, snapTo, type Snap, type SnapTargets } from '../snap.ts';
import { canMove, findPart, keyPoints, nearestOf, thingAt, thingIds, thingsInBox } from '../things.ts';
import { snapStep } from '../ticks.ts';
import { arrowShift, RECORD, type Preview, type ToolAction, type ToolContext, type ToolInput, type ToolStep } from './tool.ts';

/** A hand trembles less than this. */
const DRAG_PIXELS = 4;
const HANDLE_PIXELS = 8;

type Gesture =
  | { readonly kind: 'idle' }
  /** Pressed on a thing; a drag begins once the pointer has gone far enough. */
  | { readonly kind: 'pressed'; readonly id: string; readonly at: XY; readonly additive: boolean; readonly key: string }
  | {
      readonly kind: 'moving';
      readonly ids: readonly string[];
      readonly from: XY;
      /** The point of the thing that snaps. */
      readonly anchor: XY;
      readonly targets: SnapTargets;
      /** Moved so far. */
      readonly done: XY;
      readonly key: string;
    }
  | {
      readonly kind: 'resizing';
      readonly part: Part;
      readonly handle: string;
      readonly targets: SnapTargets;
      readonly key: string;
    }
  | { readonly kind: 'banding'; readonly from: XY; readonly to: XY; readonly kept: readonly string[] };

export interface SelectState {
  readonly kind: 'select';
  readonly gesture: Gesture;
}

export const SELECT_AT_REST: SelectState = { kind: 'select', gesture: { kind: 'idle' } };

type Step = ToolStep<SelectState>;
type Pointer = Extract<ToolInput, { at: XY }>;
type Key = Extract<ToolInput, { kind: 'key' }>;

function step(gesture: Gesture, commands: readonly ToolAction[] = [], extra: Partial<Step> = {}): Step {
  return {
    state: { kind: 'select', gesture },
    commands,
    cursor: 'default',
    preview: null,
    typed: null,
    snap: null,
    handled: true,
    ...extra,
  };
}

const IDLE: Gesture = { kind: 'idle' };

export function reduceSelect(state: SelectState, input: ToolInput, context: ToolContext): Step {
  switch (input.kind) {
    case 'press':
      return press(input, context);
    case 'move':
      return move(state.gesture, input, context);
    case 'release':
      return release(state.gesture, context);
    case 'double':
      return step(IDLE, context.selection.length === 1 ? [{ do: 'open dimension' }] : []);
    case 'key':
      return state.gesture.kind === 'idle' ? key(input, context) : keyDuringGesture(state.gesture, input);
  }
}

/** The handle of the only selected part under a point. */
export function handleAt(context: ToolContext, at: XY): { readonly part: Part; readonly handle: string } | null {
  const part = context.selection.length === 1 ? findPart(context.job, context.selection[0]) : null;
  if (part === null) return null;
  const reach = HANDLE_PIXELS / context.pixelsPerMetre;
  const handle = listHandles(part, context.job.values).find((h) => Math.hypot(h.at[0] - at[0], h.at[1] - at[1]) < reach);
  return handle === undefined ? null : { part, handle: handle.name };
}

function press(input: Pointer, context: ToolContext): Step {
  const grabbed = handleAt(context, input.at);
  if (grabbed !== null) {
    const targets = makeSnapTargets(context.resolved, [grabbed.part.id]);
    return step({ kind: 'resizing', ...grabbed, targets, key: context.gesture }, [], { cursor: 'grabbing' });
  }
  const id = thingAt(context.resolved, input.at, context.pixelsPerMetre);
  if (id === null) {
    const kept = input.shift ? context.selection : [];
    return step({ kind: 'banding', from: input.at, to: input.at, kept }, [{ do: 'select', ids: kept }], { cursor: 'crosshair' });
  }
  const pressed: Gesture = { kind: 'pressed', id, at: input.at, additive: input.shift || input.ctrl, key: context.gesture };
  return step(pressed, selectionOnPress(pressed, context), { cursor: 'grab' });
}

/** A plain press on something not selected selects it at once, so that press and drag is one movement of the hand. */
function selectionOnPress(pressed: Gesture & { kind: 'pressed' }, { selection }: ToolContext): readonly ToolAction[] {
  if (!pressed.additive) return selection.includes(pressed.id) ? [] : [{ do: 'select', ids: [pressed.id] }];
  const ids = selection.includes(pressed.id) ? selection.filter((id) => id !== pressed.id) : [...selection, pressed.id];
  return [{ do: 'select', ids }];
}

function move(gesture: Gesture, input: Pointer, context: ToolContext): Step {
  switch (gesture.kind) {
    case 'idle': {
      if (handleAt(context, input.at) !== null) return step(gesture, [], { cursor: 'grab' });
      const over = thingAt(context.resolved, input.at, context.pixelsPerMetre) !== null;
      return step(gesture, [], { cursor: over ? 'pointer' : 'default' });
    }
    case 'pressed': {
      const gone = Math.hypot(input.at[0] - gesture.at[0], input.at[1] - gesture.at[1]);
      if (gone * context.pixelsPerMetre < DRAG_PIXELS) return step(gesture, [], { cursor: 'grab' });
      return drag(startMoving(gesture, context), input, context);
    }
    case 'moving':
      return drag(gesture, input, context);
    case 'resizing':
      return resize(gesture, input, context);
    case 'banding':
      return band({ ...gesture, to: input.at }, context);
  }
}

function startMoving(pressed: Gesture & { kind: 'pressed' }, context: ToolContext): Gesture & { kind: 'moving' } {
  const chosen = context.selection.includes(pressed.id) ? context.selection : [pressed.id];
  return {
    kind: 'moving',
    ids: chosen.filter((id) => canMove(context.job, id)),
    from: pressed.at,
    anchor: nearestOf(keyPoints(context.resolved, pressed.id), pressed.at),
    targets: makeSnapTargets(context.resolved, chosen),
    done: [0, 0],
    key: pressed.key,
  };
}

function drag(gesture: Gesture & { kind: 'moving' }, input: Pointer, context: ToolContext): Step {
  let [dx, dy] = [input.at[0] - gesture.from[0], input.at[1] - gesture.from[1]];
  if (input.shift) [dx, dy] = Math.abs(dx) > Math.abs(dy) ? [dx, 0] : [0, dy];
  const snap = snapTo([gesture.anchor[0] + dx, gesture.anchor[1] + dy], gesture.targets, context.pixelsPerMetre, input.alt);
  const wanted = shiftWanted(gesture.anchor, [dx, dy], snap, snapStep(context.pixelsPerMetre));
  const [dxMetres, dyMetres] = [wanted[0] - gesture.done[0], wanted[1] - gesture.done[1]];
  const shown = { cursor: 'grabbing', snap };
  if (gesture.ids.length === 0 || (dxMetres === 0 && dyMetres === 0)) return step(gesture, [], shown);
  const policy = { kind: 'join', key: gesture.key } as const;
  const command = { do: 'move', ids: gesture.ids, dxMetres, dyMetres } as const;
  return step({ ...gesture, done: wanted }, [{ do: 'edit', command, policy }], shown);
}

/** On the bare grid the way is rounded, not the place: a drag along x leaves y alone. Shift has taken one axis out already. */
function shiftWanted(anchor: XY, [dx, dy]: XY, snap: Snap, step: number): XY {
  if (snap.kind === 'grid') return [roundTo(dx, step), roundTo(dy, step)];
  if (snap.kind === 'free') return [roundTo(dx, step / 10), roundTo(dy, step / 10)];
  return [dx === 0 ? 0 : snap.at[0] - anchor[0], dy === 0 ? 0 : snap.at[1] - anchor[1]];
}

/** Always from the part as it was pressed, so that no rounding piles up on the way. */
function resize(gesture: Gesture & { kind: 'resizing' }, input: Pointer, context: ToolContext): Step {
  const snap = snapTo(input.at, gesture.targets, context.pixelsPerMetre, input.alt);
  const [x, y] = snap.kind === 'point' ? snap.at : tidyHandle(gesture, snap.at, input, context);
  const item = dragHandle(gesture.part, gesture.handle, x, y, context.job.values);
  const policy = { kind: 'join', key: gesture.key } as const;
  return step(gesture, [{ do: 'edit', command: { do: 'put', item }, policy }], { cursor: 'grabbing', snap });
}

const ONE_DEGREE = Math.PI / 180;

/** Radii go by whole steps of the grid, angles by whole degrees (15 with Shift), whatever the direction of the hand. */
function tidyHandle(gesture: Gesture & { kind: 'resizing' }, at: XY, { shift, alt }: Pointer, context: ToolContext): XY {
  const centre = listHandles(gesture.part, context.job.values).find((handle) => handle.name === 'centre')?.at;
  if (centre === undefined) return at;
  const step = snapStep(context.pixelsPerMetre);
  if (['radius', 'inner', 'outer'].includes(gesture.handle)) return roundReach(centre, at, alt ? step / 10 : step);
  if (gesture.handle !== 'from' && gesture.handle !== 'to') return at;
  const [dx, dy] = [at[0] - centre[0], at[1] - centre[1]];
  return polar(centre, Math.hypot(dx, dy), roundTo(Math.atan2(dy, dx), shift ? 15 * ONE_DEGREE : ONE_DEGREE));
}

function band(gesture: Gesture & { kind: 'banding' }, context: ToolContext): Step {
  const { from, to } = gesture;
  const box = {
    left: Math.min(from[0], to[0]),
    right: Math.max(from[0], to[0]),
    bottom: Math.min(from[1], to[1]),
    top: Math.max(from[1], to[1]),
  };
  const preview: Preview = { kind: 'band', box };
  const ids = [...new Set([...gesture.kept, ...thingsInBox(context.resolved, box)])];
  const same = ids.length === context.selection.length && ids.every((id) => context.selection.includes(id));
  return step(gesture, same ? [] : [{ do: 'select', ids }], { cursor: 'crosshair', preview });
}

/** A plain click on one of several selected things leaves that one selected. */
function release(gesture: Gesture, context: ToolContext): Step {
  const narrow = gesture.kind === 'pressed' && !gesture.additive && context.selection.length > 1;
  return step(IDLE, narrow ? [{ do: 'select', ids: [gesture.id] }] : []);
}

function keyDuringGesture(gesture: Gesture, input: Key): Step {
  if (input.key !== 'Escape') return step(gesture, [], { handled: false });
  const bails = gesture.kind === 'moving' || gesture.kind === 'resizing';
  return step(IDLE, bails ? [{ do: 'bail', key: gesture.key }] : []);
}

function key(input: Key, context: ToolContext): Step {
  const { selection, job } = context;
  const unhandled = step(IDLE, [], { handled: false });
  if (input.key === 'Tab') return cycle(input.shift, context);
  if (input.ctrl && input.key.toLowerCase() === 'a') return step(IDLE, [{ do: 'select', ids: thingIds(job) }]);
  if (selection.length === 0) return unhandled;
  if (input.ctrl) return input.key.toLowerCase() === 'd' ? step(IDLE, duplicate(context)) : unhandled;
  const shift = arrowShift(input.key, input.shift, snapStep(context.pixelsPerMetre));
  if (shift !== null) return step(IDLE, nudge(shift, context));
  switch (input.key) {
    case 'Escape':
      return step(IDLE, [{ do: 'select', ids: [] }]);
    case 'Enter':
      return step(IDLE, [{ do: 'open dimension' }]);
    case 'Delete':
    case 'Backspace':
      return step(IDLE, removeSelected(context));
    case '[':
      return step(IDLE, reorder(-1, context));
    case ']':
      return step(IDLE, reorder(1, context));
    default:
      return unhandled;
  }
}

/** Past the last thing (or before the first) the selection is dropped and Tab goes on to the page. */
function cycle(backwards: boolean, { job, selection }: ToolContext): Step {
  const ids = thingIds(job);
  const last = selection.at(-1);
  const now = last === undefined ? (backwards ? ids.length : -1) : ids.indexOf(last);
  const next = ids[now + (backwards ? -1 : 1)];
  const left = now + (backwards ? -1 : 1) < 0;
  if (next === undefined || left) return step(IDLE, [{ do: 'select', ids: [] }], { handled: false });
  return step(IDLE, [{ do: 'select', ids: [next] }]);
}

/** Nudges of the same things in a row are one undo step. */
function nudge([dxMetres, dyMetres]: XY, { job, selection }: ToolContext): readonly ToolAction[] {
  const ids = selection.filter((id) => canMove(job, id));
  if (ids.length === 0) return [];
  const policy = { kind: 'join', key: `nudge ${ids.join(' ')}` } as const;
  return [{ do: 'edit', command: { do: 'move', ids, dxMetres, dyMetres }, policy }];
}

export function removeSelected({ selection }: ToolContext): readonly ToolAction[] {
  return [
    { do: 'edit', command: { do: 'remove', ids: selection }, policy: RECORD },
    { do: 'select', ids: [] },
  ];
}

/** The copy stands two steps of the grid aside, where a hand can take it. */
export function duplicate({ selection, pixelsPerMetre }: ToolContext): readonly ToolAction[] {
  const aside = 2 * snapStep(pixelsPerMetre);
  const command = { do: 'duplicate', ids: selection, dxMetres: aside, dyMetres: -aside } as const;
  return [{ do: 'edit', command, policy: RECORD }, { do: 'select new' }];
}

/** One place up or down in the painting order. */
export function reorder(by: 1 | -1, { job, selection }: ToolContext): readonly ToolAction[] {
  const at = job.parts.findIndex((part) => part.id === selection[0]);
  const to = at + by;
  const id = selection[0];
  if (selection.length !== 1 || id === undefined || at < 0 || to < 0 || to >= job.parts.length) return [];
  return [{ do: 'edit', command: { do: 'reorder', id, to }, policy: RECORD }];
}
