// Owns what the chrome over the canvas shows: numbers of dimensions, the typing box, the coordinates, words for the ear.
// Must not know React, the DOM, stores, or how anything is drawn.
import { formatQuantity } from '../../base/quantity.ts';
import type { Job, Part, ResolvedJob, XY } from '../../model/job.ts';
import type { PlacedDimension } from './layers/selection-layer.ts';
import { roundTo, type Snap } from './snap.ts';
import { findPart, nameOf } from './things.ts';
import { snapStep, tidyLength } from './ticks.ts';
import type { ToolState } from './tools/reduce-tool.ts';
import type { TypedBox } from './tools/tool.ts';
import { toScreen, type Viewport } from './viewport.ts';

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
  readonly hint: string | null;
  /** Selection in words, for the live region. */
  readonly said: string;
}

export const EMPTY_OVERLAY: SheetOverlay = { chips: [], editing: null, typed: null, readout: null, hint: null, said: '' };

export function makeChips(part: Part, placed: readonly PlacedDimension[]): readonly DimensionChip[] {
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

export function placeTyped(typed: TypedBox, view: Viewport): SheetOverlay['typed'] {
  const [x, y] = toScreen(view, typed.at);
  return { ...typed, x, y };
}

/** Coordinates to a tenth of the snapping grid, finer than a pixel. */
export function makeReadout(at: XY, pixelsPerMetre: number): SheetOverlay['readout'] {
  const step = snapStep(pixelsPerMetre) / 10;
  return { x: tidyLength(roundTo(at[0], step)), y: tidyLength(roundTo(at[1], step)) };
}

/** What the tool in hand waits for, in one line; nothing while selecting. */
export function hintOf(state: ToolState, snap: Snap | null): string | null {
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
export function describeSelection(job: Job, resolved: ResolvedJob, selection: readonly string[]): string {
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
