// Owns placing a probe or a line current: by pointer, by typed coordinates or by arrow keys.
// Must not know the DOM, stores, or how things are drawn.
import type { Drive, Probe, XY } from '../../../model/job.ts';
import { makeLineCurrent, makeProbe } from '../../../model/new-job.ts';
import { makeSnapTargets, roundTo, snapTo, type Snap } from '../snap.ts';
import { snapStep, tidyLength } from '../ticks.ts';
import { arrowShift, RECORD, type ToolAction, type ToolContext, type ToolInput, type ToolStep } from './tool.ts';
import { isTyping, NOTHING_TYPED, readTyped, typeKey, type TypedState } from './typed-values.ts';

export interface PlaceState {
  readonly kind: 'place';
  readonly thing: 'probe' | 'line current';
  readonly cursor: XY;
  readonly typed: TypedState;
  readonly snap: Snap | null;
}

type Step = ToolStep<PlaceState>;

export function startPlacing(thing: PlaceState['thing'], at: XY): PlaceState {
  return { kind: 'place', thing, cursor: at, typed: NOTHING_TYPED, snap: null };
}

export function reducePlace(state: PlaceState, input: ToolInput, context: ToolContext): Step {
  if (input.kind === 'key') return reduceKey(state, input, context);
  const snap = snapTo(input.at, makeSnapTargets(context.resolved), context.pixelsPerMetre, input.alt);
  const aimed: PlaceState = { ...state, cursor: snap.at, snap };
  return input.kind === 'press' ? place(aimed, context) : show(aimed, context);
}

function reduceKey(state: PlaceState, input: Extract<ToolInput, { kind: 'key' }>, context: ToolContext): Step {
  if (input.ctrl) return { ...show(state, context), handled: false };
  if (input.key === 'Escape') {
    if (isTyping(state.typed)) return show({ ...state, typed: NOTHING_TYPED }, context);
    return bare(state, [{ do: 'take', tool: { kind: 'select' } }]);
  }
  if (input.key === 'Enter') return place(state, context);
  const step = snapStep(context.pixelsPerMetre);
  const shift = arrowShift(input.key, input.shift, step);
  if (shift !== null) {
    const cursor: XY = [roundTo(state.cursor[0] + shift[0], step), roundTo(state.cursor[1] + shift[1], step)];
    return show({ ...state, cursor, snap: null }, context);
  }
  const typed = typeKey(state.typed, input.key, input.shift, 2);
  return typed === null ? { ...show(state, context), handled: false } : show({ ...state, typed }, context);
}

/** A typed coordinate is kept as typed, expressions included. */
function coordinates(state: PlaceState, context: ToolContext): { texts: [string, string]; at: XY; problem: string | null } {
  const read = ([0, 1] as const).map((axis) => readTyped(state.typed, axis, 'length', context));
  const wrong = read.find((typed) => typed.kind === 'wrong');
  const [x, y] = read.map((typed, axis) => (typed.kind === 'value' ? typed.value : (state.cursor[axis] ?? 0)));
  const [xText, yText] = read.map((typed, axis) => (typed.kind === 'value' ? typed.text : tidyLength(state.cursor[axis] ?? 0)));
  return {
    texts: [xText ?? '0 mm', yText ?? '0 mm'],
    at: [x ?? 0, y ?? 0],
    problem: wrong === undefined ? null : wrong.message,
  };
}

function place(state: PlaceState, context: ToolContext): Step {
  const { texts, problem } = coordinates(state, context);
  if (problem !== null) return show(state, context);
  const item: Drive | Probe = state.thing === 'probe' ? makeProbe(context.job, texts) : makeLineCurrent(context.job, texts);
  const command =
    'kind' in item ? ({ do: 'add', list: 'drives', item } as const) : ({ do: 'add', list: 'probes', item } as const);
  return bare({ ...state, typed: NOTHING_TYPED }, [
    { do: 'edit', command, policy: RECORD },
    { do: 'select', ids: [item.id] },
    { do: 'take', tool: { kind: 'select' } },
  ]);
}

function bare(state: PlaceState, commands: readonly ToolAction[]): Step {
  return { state, commands, cursor: 'crosshair', preview: null, typed: null, snap: null, handled: true };
}

function show(state: PlaceState, context: ToolContext): Step {
  const { at, problem } = coordinates(state, context);
  const fields = (['x', 'y'] as const).map((name, axis) => ({
    name,
    text: state.typed.texts[axis] ?? '',
    live: tidyLength(state.cursor[axis] ?? 0),
  }));
  return {
    ...bare(state, []),
    preview: { kind: 'place', at },
    typed: { at, fields, active: state.typed.active, problem },
    snap: isTyping(state.typed) ? null : state.snap,
  };
}
