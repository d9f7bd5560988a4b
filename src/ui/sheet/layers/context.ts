// Owns the narrow drawing context every layer draws through, and small strokes shared by layers.
// Must not know the DOM beyond these names, stores, or the job.
import type { Outline, XY } from '../../../model/job.ts';
import { toScreen, type Size, type Viewport } from '../viewport.ts';
import type { Palette } from '../palette.ts';

/** What a layer may use of a canvas; narrow, so that a recorder can stand in for it in tests. */
export type LayerContext = Pick<
  CanvasRenderingContext2D,
  | 'save'
  | 'restore'
  | 'beginPath'
  | 'moveTo'
  | 'lineTo'
  | 'arc'
  | 'rect'
  | 'closePath'
  | 'clip'
  | 'fill'
  | 'stroke'
  | 'fillRect'
  | 'strokeRect'
  | 'fillText'
  | 'strokeText'
  | 'measureText'
  | 'setLineDash'
  | 'translate'
  | 'rotate'
  | 'drawImage'
  | 'createLinearGradient'
  | 'createRadialGradient'
  | 'fillStyle'
  | 'strokeStyle'
  | 'lineWidth'
  | 'lineJoin'
  | 'lineCap'
  | 'lineDashOffset'
  | 'globalAlpha'
  | 'globalCompositeOperation'
  | 'font'
  | 'textAlign'
  | 'textBaseline'
  | 'imageSmoothingEnabled'
  | 'imageSmoothingQuality'
>;

/** What every layer is given: where to draw, at which scale, in which colours. Sizes in CSS pixels. */
export interface Surface {
  readonly context: LayerContext;
  readonly view: Viewport;
  readonly size: Size;
  readonly palette: Palette;
}

export const SANS = '"Inter Variable", Inter, "Helvetica Neue", Arial, sans-serif';

/** Adds the rings of an outline to the path under way. */
export function traceOutline({ context, view }: Surface, outline: Outline): void {
  for (const ring of outline) {
    ring.forEach((point, k) => {
      const [x, y] = toScreen(view, point);
      if (k === 0) context.moveTo(x, y);
      else context.lineTo(x, y);
    });
    context.closePath();
  }
}

export function strokeSegment(context: LayerContext, from: XY, to: XY): void {
  context.beginPath();
  context.moveTo(from[0], from[1]);
  context.lineTo(to[0], to[1]);
  context.stroke();
}

/** An open arrow head at `tip`, pointing along the screen angle. */
export function strokeArrowHead(context: LayerContext, tip: XY, screenAngle: number, length: number): void {
  const spread = 0.62;
  const wing = (turn: number): XY => [
    tip[0] - length * Math.cos(screenAngle + turn),
    tip[1] - length * Math.sin(screenAngle + turn),
  ];
  const [left, right] = [wing(spread), wing(-spread)];
  context.beginPath();
  context.moveTo(left[0], left[1]);
  context.lineTo(tip[0], tip[1]);
  context.lineTo(right[0], right[1]);
  context.stroke();
}

/** Text that stays readable on any field: a halo of the sheet's colour under the ink. */
export function haloText({ context, palette }: Surface, text: string, x: number, y: number, ink: string): void {
  context.lineWidth = 3;
  context.lineJoin = 'round';
  context.setLineDash([]);
  context.strokeStyle = palette.halo;
  context.strokeText(text, x, y);
  context.fillStyle = ink;
  context.fillText(text, x, y);
}

/** On the screen, pixels. */
export interface ScreenBox {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}
