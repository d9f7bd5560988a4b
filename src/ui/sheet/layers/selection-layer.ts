// Owns how selection, hover, handles, dimensions, previews and snap marks look.
// Must not know the DOM, stores, or tools beyond what they show.
import { formatQuantity } from '../../../base/quantity.ts';
import type { Job, Outline, Part, ResolvedJob, XY } from '../../../model/job.ts';
import { makeNumberReader } from '../../../model/number-reader.ts';
import { listDimensions, listHandles, rulesOf } from '../../../model/parts/registry.ts';
import type { PartDimension } from '../../../model/parts/part-kind.ts';
import type { Snap } from '../snap.ts';
import type { Preview } from '../tools/tool.ts';
import { boxToScreen, FOOT_HEIGHT, RULER_LEFT, RULER_TOP, toScreen, type Size, type Viewport } from '../viewport.ts';
import { SANS, strokeSegment, traceOutline, type Surface } from './context.ts';
import { LINE_CURRENT_RADIUS_PIXELS, planeWaveFront } from './drives-layer.ts';
import { sheetBox } from './edges-layer.ts';

const HANDLE_PIXELS = 7;
const DIMENSION_OFFSET = 24;

/** Numbers are wider than high: beside an upright line they need this much more room. */
const UPRIGHT_OFFSET = 28;

/** A selected or hovered thing is outlined in the accent. */
export function drawMark(surface: Surface, job: ResolvedJob, id: string, kind: 'selected' | 'hovered'): void {
  const { context, palette } = surface;
  context.strokeStyle = palette.accent;
  context.lineWidth = kind === 'selected' ? 2 : 1.4;
  context.globalAlpha = kind === 'selected' ? 1 : 0.7;
  context.setLineDash([]);
  context.beginPath();
  traceThing(surface, job, id);
  context.stroke();
  context.globalAlpha = 1;
}

function traceThing(surface: Surface, job: ResolvedJob, id: string): void {
  const { context, view } = surface;
  const part = job.parts.find((candidate) => candidate.id === id);
  if (part !== undefined) return traceOutline(surface, part.outline);
  const sign = [...job.drives, ...job.probes].find((candidate) => candidate.id === id);
  if (sign === undefined) return;
  if ('at' in sign) {
    const [x, y] = toScreen(view, sign.at);
    const radius = LINE_CURRENT_RADIUS_PIXELS + 5;
    context.moveTo(x + radius, y);
    context.arc(x, y, radius, 0, 2 * Math.PI);
    return;
  }
  const [from, to] = planeWaveFront(sheetBox(job.sheet), sign.angleRadians).map((at) => toScreen(view, at));
  if (from === undefined || to === undefined) return;
  context.moveTo(from[0], from[1]);
  context.lineTo(to[0], to[1]);
}

export function drawHandles(surface: Surface, part: Part, job: Job): void {
  const { context, palette, view } = surface;
  context.lineWidth = 1.4;
  context.strokeStyle = palette.accent;
  context.fillStyle = palette.sheet;
  for (const handle of listHandles(part, job.values)) {
    const [x, y] = toScreen(view, handle.at);
    const half = HANDLE_PIXELS / 2;
    context.fillRect(x - half, y - half, HANDLE_PIXELS, HANDLE_PIXELS);
    context.strokeRect(x - half, y - half, HANDLE_PIXELS, HANDLE_PIXELS);
  }
}

/** Where a dimension stands on screen: its line set aside from what it measures, and the place of its number. */
export interface PlacedDimension {
  readonly dimension: PartDimension;
  readonly text: string;
  readonly from: XY;
  readonly to: XY;
  readonly feet: readonly [XY, XY];
  readonly label: XY;
}

/** Dimensions narrower than this on screen have their number beside, not on, the line. */
const NARROW_PIXELS = 64;

/** Sides shorter than this on screen are not measured: zoomed in, they are. */
const LEAST_PIXELS = 12;

/** Room a number takes; one that would cover another is left out until there is room. */
const NUMBER_ROOM: Size = { width: 66, height: 22 };

export function placeDimensions(part: Part, job: Job, view: Viewport, size: Size): readonly PlacedDimension[] {
  const dimensions = listDimensions(part, job.values);
  const middle = middleOf(dimensions.flatMap((d) => [toScreen(view, d.from), toScreen(view, d.to)]));
  const placed: PlacedDimension[] = [];
  for (const dimension of dimensions) {
    const next = placeDimension(dimension, middle, view, size);
    const side = dimension.path.startsWith('points');
    const short = Math.hypot(next.to[0] - next.from[0], next.to[1] - next.from[1]) < LEAST_PIXELS;
    const covered = placed.some(
      ({ label }) =>
        Math.abs(label[0] - next.label[0]) < NUMBER_ROOM.width && Math.abs(label[1] - next.label[1]) < NUMBER_ROOM.height,
    );
    if (!(side && short) && !covered) placed.push(next);
  }
  return placed;
}

function placeDimension(dimension: PartDimension, middle: XY, view: Viewport, size: Size): PlacedDimension {
  const [a, b] = [toScreen(view, dimension.from), toScreen(view, dimension.to)];
  const text = formatQuantity(dimension.value, dimension.dimension, 6);
  const length = Math.hypot(b[0] - a[0], b[1] - a[1]);
  const along: XY = length === 0 ? [1, 0] : [(b[0] - a[0]) / length, (b[1] - a[1]) / length];
  const radial = ['radius', 'inner', 'outer'].includes(dimension.path) || dimension.dimension === 'angle';
  const aside = radial ? 0 : DIMENSION_OFFSET + UPRIGHT_OFFSET * Math.abs(along[1]);
  const out = outward(a, b, along, middle);
  const from: XY = [a[0] + out[0] * aside, a[1] + out[1] * aside];
  const to: XY = [b[0] + out[0] * aside, b[1] + out[1] * aside];
  const beside = length < NARROW_PIXELS;
  const label: XY = beside ? [to[0] + along[0] * 34, to[1] + along[1] * 22] : middleOfSeen(from, to, size);
  return { dimension, text, from, to, feet: [a, b], label };
}

/** The middle of what is seen of a line: a long wall keeps its number in view when the person looks at one end. */
function middleOfSeen(from: XY, to: XY, size: Size): XY {
  const low: XY = [RULER_LEFT + NUMBER_ROOM.width / 2, RULER_TOP + NUMBER_ROOM.height / 2];
  const high: XY = [size.width - NUMBER_ROOM.width / 2, size.height - FOOT_HEIGHT - NUMBER_ROOM.height / 2];
  let [enter, leave] = [0, 1];
  for (const axis of [0, 1] as const) {
    const step = to[axis] - from[axis];
    if (step === 0) continue;
    const [t, u] = [(low[axis] - from[axis]) / step, (high[axis] - from[axis]) / step];
    enter = Math.max(enter, Math.min(t, u));
    leave = Math.min(leave, Math.max(t, u));
  }
  const t = enter < leave ? (enter + leave) / 2 : 0.5;
  return [from[0] + t * (to[0] - from[0]), from[1] + t * (to[1] - from[1])];
}

function middleOf(points: readonly XY[]): XY {
  const sum = points.reduce<XY>((total, p) => [total[0] + p[0], total[1] + p[1]], [0, 0]);
  return [sum[0] / Math.max(1, points.length), sum[1] / Math.max(1, points.length)];
}

/** The normal of the line that points away from the middle of the part. */
function outward(a: XY, b: XY, along: XY, middle: XY): XY {
  const normal: XY = [-along[1], along[0]];
  const side = ((a[0] + b[0]) / 2 - middle[0]) * normal[0] + ((a[1] + b[1]) / 2 - middle[1]) * normal[1];
  return side >= 0 ? normal : [-normal[0], -normal[1]];
}

/** Extension lines, dimension line and its ticks; the numbers stand over the canvas, where they can be edited. */
export function drawDimensions(surface: Surface, placed: readonly PlacedDimension[]): void {
  const { context, palette } = surface;
  context.strokeStyle = palette.ink;
  context.lineWidth = 0.9;
  context.setLineDash([]);
  for (const { from, to, feet, label } of placed) {
    strokeSegment(context, feet[0], from);
    strokeSegment(context, feet[1], to);
    strokeSegment(context, from, to);
    strokeSegment(context, to, label);
    for (const [x, y] of [from, to]) strokeSegment(context, [x - 3, y + 3], [x + 3, y - 3]);
  }
}

export function drawPreview(surface: Surface, preview: Preview, job: Job): void {
  const { context, palette, view } = surface;
  context.strokeStyle = palette.accent;
  context.fillStyle = palette.accent;
  context.lineWidth = 1.4;
  if (preview.kind === 'band') {
    const { x, y, width, height } = boxToScreen(view, preview.box);
    context.globalAlpha = 0.1;
    context.fillRect(x, y, width, height);
    context.globalAlpha = 1;
    context.setLineDash([4, 3]);
    context.strokeRect(x, y, width, height);
    context.setLineDash([]);
    return;
  }
  if (preview.kind === 'place') return drawCross(surface, preview.at);
  const outline = preview.part === null ? null : outlineOf(preview.part, job);
  if (outline !== null) {
    context.beginPath();
    traceOutline(surface, outline);
    context.globalAlpha = 0.16;
    context.fill('evenodd');
    context.globalAlpha = 1;
    context.stroke();
  }
  drawPoints(surface, preview.points);
}

function outlineOf(part: Part, job: Job): Outline | null {
  const drawn = rulesOf(part).draw(part, makeNumberReader(job.values), '');
  return drawn.ok ? drawn.value.outline : null;
}

/** The path set so far, with a point at each corner; long freehand paths carry none. */
function drawPoints(surface: Surface, points: readonly XY[]): void {
  const { context, view, palette } = surface;
  context.setLineDash([2, 3]);
  context.lineWidth = 1;
  context.beginPath();
  points.forEach((point, k) => {
    const [x, y] = toScreen(view, point);
    if (k === 0) context.moveTo(x, y);
    else context.lineTo(x, y);
  });
  context.stroke();
  context.setLineDash([]);
  if (points.length > 60) return;
  context.fillStyle = palette.accent;
  for (const point of points) {
    const [x, y] = toScreen(view, point);
    context.beginPath();
    context.arc(x, y, 2.6, 0, 2 * Math.PI);
    context.fill();
  }
}

function drawCross(surface: Surface, at: XY): void {
  const [x, y] = toScreen(surface.view, at);
  const { context } = surface;
  strokeSegment(context, [x - 9, y], [x + 9, y]);
  strokeSegment(context, [x, y - 9], [x, y + 9]);
  context.beginPath();
  context.arc(x, y, 5, 0, 2 * Math.PI);
  context.stroke();
}

/** A ring where a point of the drawing is met, a lozenge on a line; the words stand beside it. */
export function drawSnap(surface: Surface, snap: Snap): void {
  if (snap.words === null) return;
  const { context, palette, view } = surface;
  const [x, y] = toScreen(view, snap.at);
  context.strokeStyle = palette.warn;
  context.lineWidth = 1.6;
  context.setLineDash([]);
  context.beginPath();
  if (snap.kind === 'point') context.arc(x, y, 6, 0, 2 * Math.PI);
  else {
    context.moveTo(x, y - 6);
    context.lineTo(x + 6, y);
    context.lineTo(x, y + 6);
    context.lineTo(x - 6, y);
    context.closePath();
  }
  context.stroke();
  context.font = `11px ${SANS}`;
  context.textAlign = 'left';
  context.textBaseline = 'middle';
  const width = context.measureText(snap.words).width;
  context.fillStyle = palette.halo;
  context.fillRect(x + 10, y - 22, width + 8, 16);
  context.fillStyle = palette.ink;
  context.fillText(snap.words, x + 14, y - 13.5);
}
