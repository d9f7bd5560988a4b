// Owns the three stacked canvases of the sheet: their size in device pixels, and painting each on demand.
// Must not know stores, React, tools, or events.
import type { FieldFrame } from '../../../workers/protocol.ts';
import type { ResolvedJob } from '../../model/job.ts';
import { makeFieldPainter } from './field-picture.ts';
import type { Surface } from './layers/context.ts';
import { drawField, type FieldPicture } from './layers/field-layer.ts';
import type { Palette } from './palette.ts';
import { paintDrawing, paintMarks, type Marks } from './sheet-painter.ts';
import type { Size, Viewport } from './viewport.ts';

export interface Canvases {
  readonly field: HTMLCanvasElement;
  readonly drawing: HTMLCanvasElement;
  readonly marks: HTMLCanvasElement;
}

export interface FieldShown {
  readonly frame: FieldFrame | null;
  readonly fullScale: number;
  readonly spanDb: number;
}

export interface Stage {
  /** CSS pixels and device pixels per CSS pixel; true when anything changed. */
  resize(size: Size, devicePixelRatio: number): boolean;
  /** Turns a frame into the picture that `paintField` lays. */
  takeFrame(shown: FieldShown, palette: Palette): void;
  paintField(view: Viewport, palette: Palette, resolved: ResolvedJob): void;
  paintDrawing(view: Viewport, palette: Palette, resolved: ResolvedJob): void;
  paintMarks(view: Viewport, palette: Palette, marks: Marks): void;
}

export function makeStage(canvases: Canvases): Stage {
  const painter = makeFieldPainter();
  const contexts = {
    field: contextOf(canvases.field),
    drawing: contextOf(canvases.drawing),
    marks: contextOf(canvases.marks),
  };
  let size: Size = { width: 1, height: 1 };
  let ratio = 1;
  let picture: FieldPicture | null = null;

  const surfaceOn = (name: keyof Canvases, view: Viewport, palette: Palette): Surface => {
    const context = contexts[name];
    context.setTransform(ratio, 0, 0, ratio, 0, 0);
    context.clearRect(0, 0, size.width, size.height);
    return { context, view, size, palette };
  };

  return {
    resize(to, devicePixelRatio) {
      if (to.width === size.width && to.height === size.height && devicePixelRatio === ratio) return false;
      size = to;
      ratio = devicePixelRatio;
      for (const canvas of Object.values(canvases) as HTMLCanvasElement[]) {
        canvas.width = Math.max(1, Math.round(to.width * ratio));
        canvas.height = Math.max(1, Math.round(to.height * ratio));
      }
      return true;
    },
    takeFrame({ frame, fullScale, spanDb }, palette) {
      picture = painter.paint(frame, palette, fullScale, spanDb);
    },
    paintField(view, palette, resolved) {
      drawField(surfaceOn('field', view, palette), resolved.sheet, picture);
    },
    paintDrawing(view, palette, resolved) {
      paintDrawing(surfaceOn('drawing', view, palette), resolved);
    },
    paintMarks(view, palette, marks) {
      paintMarks(surfaceOn('marks', view, palette), marks);
    },
  };
}

export function contextOf(canvas: HTMLCanvasElement): CanvasRenderingContext2D {
  const context = canvas.getContext('2d');
  if (context === null) throw new Error('this browser gives no 2-D canvas, which the sheet is drawn on');
  return context;
}
