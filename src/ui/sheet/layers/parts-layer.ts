// Owns how parts look: drafting hatch for metal, violet-grey tint for dielectrics, outlines and names.
// Must not know the DOM, stores, or tools.
import type { Medium, Outline, ResolvedPart, XY } from '../../../model/job.ts';
import { partContains } from '../../../model/outline.ts';
import { toScreen, toSheet, type Viewport } from '../viewport.ts';
import { haloText, SANS, traceOutline, type LayerContext, type ScreenBox, type Surface } from './context.ts';

const HATCH_SPACING = 5;

/** Narrower than this on screen, hatch would be noise: the part is drawn solid. */
const SOLID_BELOW_PIXELS = 3.5;

/** Narrower than this, the dashes of two sides would run into each other. */
const DASHED_FROM_PIXELS = 8;

/** Opacity of a dielectric's tint: grows with the logarithm of its permittivity, 1 is invisible, 12 and more is densest. */
export function tintOpacity(epsilonRelative: number): number {
  if (epsilonRelative <= 1) return 0;
  return 0.16 + 0.46 * Math.min(1, Math.log(epsilonRelative) / Math.log(12));
}

/**
 * Parts in painting order. Each first clears what lies under it on this canvas, so a later part of air shows the field
 * through a wall, just as the engine paints it.
 */
export function drawParts(surface: Surface, parts: readonly ResolvedPart[]): void {
  for (const part of parts) {
    clearUnder(surface, part.outline);
    fillMedium(surface, part);
    strokePart(surface, part);
  }
}

function clearUnder(surface: Surface, outline: Outline): void {
  const { context } = surface;
  context.globalCompositeOperation = 'destination-out';
  context.fillStyle = '#000';
  context.beginPath();
  traceOutline(surface, outline);
  context.fill('evenodd');
  context.globalCompositeOperation = 'source-over';
}

function fillMedium(surface: Surface, part: ResolvedPart): void {
  const { context, palette } = surface;
  const thin = narrowerThan(SOLID_BELOW_PIXELS, surface, part);
  context.beginPath();
  traceOutline(surface, part.outline);
  if (!part.medium.metal) {
    context.fillStyle = `rgb(${palette.dielectric} / ${tintOpacity(part.medium.epsilonRelative).toFixed(3)})`;
    context.fill('evenodd');
    if (isLossy(part.medium) && !thin) stippleClip(surface, part.outline);
    return;
  }
  context.fillStyle = thin ? palette.metal : palette.paper;
  context.fill('evenodd');
  if (!thin) hatchClip(surface, part.outline);
}

function narrowerThan(pixels: number, { view }: Surface, part: ResolvedPart): boolean {
  return part.smallestMetres * view.pixelsPerMetre < pixels;
}

function isLossy(medium: Medium): boolean {
  return medium.sigma > 0 || medium.sigmaMagnetic > 0;
}

/** 45 degree lines through the part, anchored to the sheet's origin so that the hatch travels with the drawing. */
function hatchClip(surface: Surface, outline: Outline): void {
  const { context, palette, view, size } = surface;
  const box = visibleBox(view, outline, size);
  if (box === null) return;
  context.save();
  context.clip('evenodd');
  context.strokeStyle = palette.metal;
  context.lineWidth = 1.5;
  context.setLineDash([]);
  context.beginPath();
  traceHatch(context, box, view.originX + view.originY);
  context.stroke();
  context.restore();
}

/** Lines x + y = const, HATCH_SPACING apart across. */
function traceHatch(context: LayerContext, box: ScreenBox, anchor: number): void {
  const pitch = HATCH_SPACING * Math.SQRT2;
  const first = anchor + Math.ceil((box.left + box.top - anchor) / pitch) * pitch;
  const height = box.bottom - box.top;
  for (let sum = first; sum <= box.right + box.bottom; sum += pitch) {
    context.moveTo(sum - box.top, box.top);
    context.lineTo(sum - box.top - height, box.bottom);
  }
}

/** Lossy media carry dots besides their tint. */
function stippleClip(surface: Surface, outline: Outline): void {
  const { context, palette, view, size } = surface;
  const box = visibleBox(view, outline, size);
  if (box === null) return;
  context.save();
  context.clip('evenodd');
  context.fillStyle = palette.dielectricLine;
  const pitch = 9;
  const startX = view.originX + Math.ceil((box.left - view.originX) / pitch) * pitch;
  const startRow = Math.ceil((box.top - view.originY) / pitch);
  for (let row = startRow; view.originY + row * pitch <= box.bottom; row++) {
    for (let x = startX + (row & 1 ? pitch / 2 : 0); x <= box.right; x += pitch) {
      context.fillRect(x, view.originY + row * pitch, 1.2, 1.2);
    }
  }
  context.restore();
}

function visibleBox(view: Viewport, outline: Outline, size: { width: number; height: number }): ScreenBox | null {
  const box = screenBoxOf(view, outline);
  const seen = {
    left: Math.max(0, box.left),
    top: Math.max(0, box.top),
    right: Math.min(size.width, box.right),
    bottom: Math.min(size.height, box.bottom),
  };
  return seen.left < seen.right && seen.top < seen.bottom ? seen : null;
}

function screenBoxOf(view: Viewport, outline: Outline): ScreenBox {
  let [left, top, right, bottom] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const ring of outline) {
    for (const point of ring) {
      const [x, y] = toScreen(view, point);
      left = Math.min(left, x);
      right = Math.max(right, x);
      top = Math.min(top, y);
      bottom = Math.max(bottom, y);
    }
  }
  return { left, top, right, bottom };
}

/** Parts left out of the reference have a dashed outline, where there is room for dashes; parts of air a dotted one. */
function strokePart(surface: Surface, part: ResolvedPart): void {
  const { context, palette } = surface;
  const air = !part.medium.metal && part.medium.epsilonRelative <= 1.0001 && !isLossy(part.medium);
  context.setLineDash(
    part.leftOutOfReference && !narrowerThan(DASHED_FROM_PIXELS, surface, part) ? [7, 3.5] : air ? [1.5, 3] : [],
  );
  context.strokeStyle = part.medium.metal ? palette.metal : air ? palette.soft : palette.dielectricLine;
  context.lineWidth = 1.2;
  context.lineJoin = 'miter';
  context.beginPath();
  traceOutline(surface, part.outline);
  context.stroke();
  context.setLineDash([]);
}

const NAME_HEIGHT = 14;

/**
 * Names stand in the middle of parts that have room for them, else beside. Of several places the first that covers no other
 * name and none of the boxes `taken` is used; a name without such a place is left out.
 */
export function drawNames(surface: Surface, parts: readonly ResolvedPart[], taken: readonly ScreenBox[]): void {
  const { context, palette } = surface;
  const boxes = [...taken];
  context.font = `500 11px ${SANS}`;
  context.textBaseline = 'middle';
  context.textAlign = 'left';
  for (const part of parts) {
    const places = namePlaces(surface, part, context.measureText(part.name).width);
    const place = places.find((box) => !boxes.some((other) => overlaps(other, box)));
    if (place === undefined) continue;
    boxes.push(place);
    haloText(surface, part.name, place.left, (place.top + place.bottom) / 2, palette.ink);
  }
}

/** Best first. */
function namePlaces({ view, size }: Surface, part: ResolvedPart, width: number): ScreenBox[] {
  const seen = visibleBox(view, part.outline, size);
  if (seen === null) return [];
  const [middleX, middleY] = [(seen.left + seen.right) / 2, (seen.top + seen.bottom) / 2];
  const wide = seen.right - seen.left - width;
  // Above the middle first, where the handle of a selected disc does not stand.
  const inside = part.medium.metal
    ? []
    : [0, 0.3, -0.3].flatMap((aside) => [-15, 0, 15].map((down): XY => [middleX + aside * wide, middleY + down]));
  const row = Math.min(seen.bottom - 10, Math.max(seen.top + 12, 40));
  return [
    ...inside.filter(([x, y]) => roomFor(view, part.outline, x, y, width)).map(([x, y]) => labelBox(x - width / 2, y, width)),
    labelBox(Math.min(seen.right + 7, size.width - width - 8), row, width),
    labelBox(Math.max(8, seen.left - 7 - width), row, width),
    labelBox(Math.max(8, middleX - width / 2), Math.max(40, seen.top - 10), width),
    labelBox(Math.max(8, middleX - width / 2), seen.bottom + 10, width),
  ];
}

function roomFor(view: Viewport, outline: Outline, x: number, y: number, width: number): boolean {
  const corners = [-1, 1].flatMap((sideways) => [-1, 1].map((up) => toSheet(view, x + sideways * (width / 2 + 6), y + up * 10)));
  return corners.every((corner) => partContains(outline, corner[0], corner[1]));
}

function labelBox(left: number, middle: number, width: number): ScreenBox {
  return { left, right: left + width, top: middle - NAME_HEIGHT / 2, bottom: middle + NAME_HEIGHT / 2 };
}

function overlaps(a: ScreenBox, b: ScreenBox): boolean {
  return a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;
}
