// Owns the map between the sheet in metres (y up) and the canvas in CSS pixels (y down): fit, pan, zoom.
// Must not know the DOM, stores, or what is drawn.
import type { XY } from '../../model/job.ts';

/** Where the user's origin stands on the canvas, and the scale. */
export interface Viewport {
  readonly originX: number;
  readonly originY: number;
  readonly pixelsPerMetre: number;
}

export interface Size {
  readonly width: number;
  readonly height: number;
}

/** A rectangle in sheet metres. */
export interface Box {
  readonly left: number;
  readonly bottom: number;
  readonly right: number;
  readonly top: number;
}

/** The rulers take the first pixels of the canvas along the top and the left. */
export const RULER_LEFT = 42;
export const RULER_TOP = 24;

/** The strip along the foot: coordinates, scale bar, legend, colour scale. */
export const FOOT_HEIGHT = 28;

/** Air round a fitted sheet: room for the words of the edges and the fading of absorbing ones. */
const FIT_MARGIN = 34;

/** Zoom range, as multiples of the fitted scale. */
const ZOOM_OUT_LIMIT = 0.2;
const ZOOM_IN_LIMIT = 2e4;

export function toScreen(view: Viewport, at: XY): XY {
  return [view.originX + at[0] * view.pixelsPerMetre, view.originY - at[1] * view.pixelsPerMetre];
}

export function toSheet(view: Viewport, x: number, y: number): XY {
  return [(x - view.originX) / view.pixelsPerMetre, (view.originY - y) / view.pixelsPerMetre];
}

export function fitView(box: Box, size: Size): Viewport {
  const roomX = Math.max(40, size.width - RULER_LEFT - 2 * FIT_MARGIN);
  const roomY = Math.max(40, size.height - RULER_TOP - FOOT_HEIGHT - 2 * FIT_MARGIN);
  const pixelsPerMetre = Math.min(roomX / (box.right - box.left), roomY / (box.top - box.bottom));
  const middleX = (RULER_LEFT + size.width) / 2;
  const middleY = (RULER_TOP + size.height - FOOT_HEIGHT) / 2;
  return {
    pixelsPerMetre,
    originX: middleX - ((box.left + box.right) / 2) * pixelsPerMetre,
    originY: middleY + ((box.bottom + box.top) / 2) * pixelsPerMetre,
  };
}

export function panView(view: Viewport, dxPixels: number, dyPixels: number): Viewport {
  return { ...view, originX: view.originX + dxPixels, originY: view.originY + dyPixels };
}

/** Zooms by `factor`; what is under (x, y) stays under it. The scale stays within sight of the fitted one. */
export function zoomAt(view: Viewport, factor: number, x: number, y: number, fittedPixelsPerMetre: number): Viewport {
  const wanted = view.pixelsPerMetre * factor;
  const pixelsPerMetre = Math.min(ZOOM_IN_LIMIT * fittedPixelsPerMetre, Math.max(ZOOM_OUT_LIMIT * fittedPixelsPerMetre, wanted));
  const ratio = pixelsPerMetre / view.pixelsPerMetre;
  return {
    pixelsPerMetre,
    originX: x + (view.originX - x) * ratio,
    originY: y + (view.originY - y) * ratio,
  };
}

/** A whole number of screen pixels is kept when the element grows: the middle of the drawing stays in the middle. */
export function resizeView(view: Viewport, from: Size, to: Size): Viewport {
  return panView(view, (to.width - from.width) / 2, (to.height - from.height) / 2);
}

export function boxToScreen(view: Viewport, box: Box): { x: number; y: number; width: number; height: number } {
  const [x, y] = toScreen(view, [box.left, box.top]);
  return { x, y, width: (box.right - box.left) * view.pixelsPerMetre, height: (box.top - box.bottom) * view.pixelsPerMetre };
}
