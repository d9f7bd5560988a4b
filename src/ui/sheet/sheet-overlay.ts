// Owns what the chrome over the canvas shows: numbers of dimensions, the typing box, the coordinates, words for the ear.
// Must not know React, the DOM, stores, or how anything is drawn.
import { formatQuantity } from '../../base/quantity.ts';
import { describeError, type AppError } from '../../base/result.ts';
import type { Job, Part, ResolvedJob, XY } from '../../model/job.ts';
import type { PlacedDimension } from './layers/selection-layer.ts';
import { roundTo, type Snap } from './snap.ts';
import { findPart, nameOf } from './things.ts';
import { snapStep, tidyLength } from './ticks.ts';
import type { ToolState } from './tools/reduce-tool.ts';
import type { TypedBox } from './tools/tool.ts';
import { FOOT_HEIGHT, toScreen, type Size, type Viewport } from './viewport.ts';

/** The number of a dimension, in CSS pixels of the canvas. */
export interface DimensionChip {
  readonly partId: string;
  readonly name: string;
  /** "3 mm", or "w = 3 mm" when the job says it by a named value. */
  readonly label: string;
  /** What the field holds when it opens. */
  readonly text: string;
  readonly x: number;
  readonly y: number;
}

export interface SheetOverlay {
  readonly chips: readonly DimensionChip[];
  /** Which chip is open as a field. */
  readonly editing: number | null;
  readonly typed: (TypedBox & { readonly x: number; readonly y: number }) | null;
  readonly readout: { readonly x: string; readonly y: string } | null;
  /** What the tool waits for, or what is wrong. */
  readonly hint: string | null;
  readonly troubled: boolean;
  /** Selection in words, for the live region. */
  readonly said: string;
}

export const EMPTY_OVERLAY: SheetOverlay = {
  chips: [],
  editing: null,
  typed: null,
  readout: null,
  hint: null,
  troubled: false,
  said: '',
};

export interface OverlayInput {
  readonly job: Job;
  readonly resolved: ResolvedJob;
  readonly selection: readonly string[];
  readonly view: Viewport;
  readonly size: Size;
  readonly dimensions: readonly PlacedDimension[];
  readonly editing: number | null;
  readonly tool: ToolState;
  readonly typed: TypedBox | null;
  readonly snap: Snap | null;
  readonly cursor: XY | null;
  /** Why the last edit made on the sheet was refused. */
  readonly refusal: AppError | null;
  /** Why the job has no numbers just now: the last good drawing stands, and that must be said. */
  readonly broken: AppError | null;
}

export function makeOverlay(input: OverlayInput): SheetOverlay {
  const { job, resolved, selection, view, size, typed, snap, refusal, broken } = input;
  const part = findPart(job, selection[0]);
  // The bare pointer, as the rulers mark it; a thing that is met gives its own coordinates.
  const at = (snap === null || snap.words === null ? input.cursor : snap.at) ?? typed?.at ?? null;
  const hint = hintOf(input.tool, snap);
  const trouble =
    refusal === null
      ? broken === null
        ? null
        : `The last good drawing is shown. ${describeError(broken)}`
      : describeError(refusal);
  return {
    chips: part === null ? [] : makeChips(part, input.dimensions),
    editing: input.editing,
    typed: typed === null ? null : placeTyped(typed, view, size),
    readout: at === null ? null : makeReadout(at, view.pixelsPerMetre),
    hint: trouble ?? hint,
    troubled: trouble !== null,
    said: trouble ?? hint ?? describeSelection(job, resolved, selection),
  };
}

function makeChips(part: Part, placed: readonly PlacedDimension[]): readonly DimensionChip[] {
  return placed.map(({ dimension, text, label: [x, y] }) => {
    const written = ownText(part, dimension.path);
    const plain = written === null || /^[-+]?[\d.]+\s*[a-zµ°]+$/i.test(written);
    return {
      partId: part.id,
      name: dimension.name,
      label: plain ? text : `${written} = ${text}`,
      text: written ?? text,
      x,
      y,
    };
  });
}

/** The quantity as written, where the dimension is one value of the part; null where it follows from coordinates. */
function ownText(part: Part, path: string): string | null {
  const value = (part as unknown as Readonly<Record<string, unknown>>)[path];
  return typeof value === 'string' ? value : null;
}

/** A bare number keeps the unit that stood there. */
export function withUnit(text: string, before: string): string {
  const unit = /[a-zµ°]+$/i.exec(before.trim())?.[0];
  return unit !== undefined && /^\s*[-+]?(\d+\.?\d*|\.\d+)\s*$/.test(text) ? `${text.trim()} ${unit}` : text;
}

const TYPED_ROOM: Size = { width: 190, height: 96 };

/** Below and to the right of the cursor, or on the other side where there is no room. */
function placeTyped(typed: TypedBox, view: Viewport, size: Size): SheetOverlay['typed'] {
  const [atX, atY] = toScreen(view, typed.at);
  const x = atX + 16 + TYPED_ROOM.width > size.width ? atX - 16 - TYPED_ROOM.width : atX + 16;
  const y = atY + 16 + TYPED_ROOM.height > size.height - FOOT_HEIGHT ? atY - TYPED_ROOM.height : atY + 16;
  return { ...typed, x: Math.max(0, x), y: Math.max(0, y) };
}

/** Coordinates to a tenth of the snapping grid, finer than a pixel. */
function makeReadout(at: XY, pixelsPerMetre: number): SheetOverlay['readout'] {
  const step = snapStep(pixelsPerMetre) / 10;
  return { x: tidyLength(roundTo(at[0], step)), y: tidyLength(roundTo(at[1], step)) };
}

/** What the tool in hand waits for, in one line; nothing while selecting. */
function hintOf(state: ToolState, snap: Snap | null): string | null {
  const met = snap?.words === undefined || snap.words === null ? '' : ` · at the ${snap.words}`;
  switch (state.kind) {
    case 'select':
      return null;
    case 'place':
      return `${capital(state.thing)}: click, or type x and y${met}`;
    case 'draw':
      return drawHint(state.part, state.points.length) + met;
  }
}

function drawHint(part: Part['kind'], set: number): string {
  if (part === 'stroke') return 'Stroke: paint with the button held; type a width before';
  if (set === 0) return `${capital(part)}: click the first point, or type x and y`;
  if (part === 'wall') return 'Wall: click or type length and angle; Shift keeps to 15°; Enter ends';
  if (part === 'polygon') return 'Polygon: click or type length and angle; Shift keeps to 15°; Enter closes';
  return `${capital(part)}: drag or click, or type its size; Tab changes the field`;
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

/** For those who hear the sheet: what is selected and where it is. */
function describeSelection(job: Job, resolved: ResolvedJob, selection: readonly string[]): string {
  const [first] = selection;
  if (first === undefined) return '';
  if (selection.length > 1) return `${selection.length} things selected: ${selection.map((id) => nameOf(job, id)).join(', ')}.`;
  const name = nameOf(job, first);
  const part = findPart(job, first);
  if (part !== null) return `${name} selected, a ${part.kind} of ${part.material}, ${paintingPlace(job, first)}.`;
  const probe = resolved.probes.find((candidate) => candidate.id === first);
  if (probe !== undefined) return `${name} selected, at ${tidyLength(probe.at[0])}, ${tidyLength(probe.at[1])}.`;
  const drive = resolved.drives.find((candidate) => candidate.id === first);
  if (drive === undefined) return '';
  if (drive.kind === 'plane wave')
    return `${name} selected, a plane wave travelling at ${formatQuantity(drive.angleRadians, 'angle', 4)}.`;
  return `${name} selected, a line current at ${tidyLength(drive.at[0])}, ${tidyLength(drive.at[1])}.`;
}

function paintingPlace(job: Job, id: string): string {
  const rank = job.parts.findIndex((part) => part.id === id) + 1;
  return `painted ${rank} of ${job.parts.length}`;
}
