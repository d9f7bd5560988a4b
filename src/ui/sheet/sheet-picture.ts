// Owns the picture of the sheet as a PNG: title, field, drawing, rulers, scale and time stamp in one image.
// Must not know stores, React, or events.
import type { FieldFrame } from '../../../workers/protocol.ts';
import { formatQuantity } from '../../base/quantity.ts';
import type { Job } from '../../model/job.ts';
import { SANS, type LayerContext } from './layers/context.ts';
import type { Palette } from './palette.ts';
import type { Marks } from './sheet-painter.ts';
import { contextOf, makeStage, type Canvases, type FieldShown } from './stage.ts';
import type { Size, Viewport } from './viewport.ts';

const HEAD_HEIGHT = 46;

/** Pictures are for print: at least two device pixels a CSS pixel. */
const PICTURE_RATIO = 2;

export interface PictureRequest {
  readonly job: Job;
  readonly view: Viewport;
  readonly size: Size;
  readonly palette: Palette;
  readonly marks: Marks;
  readonly shown: FieldShown;
  readonly fieldPlace: 'under' | 'over' | 'off';
  readonly madeAt: Date;
}

export function makePicture(request: PictureRequest): Promise<Blob> {
  const { size, palette, view, marks, shown } = request;
  const canvases: Canvases = { field: newCanvas(), drawing: newCanvas(), marks: newCanvas() };
  const stage = makeStage(canvases);
  stage.resize(size, PICTURE_RATIO);
  stage.takeFrame(shown, palette);
  stage.paintField(view, palette, marks.resolved);
  stage.paintDrawing(view, palette, marks.resolved);
  stage.paintMarks(view, palette, {
    ...marks,
    selection: [],
    hovered: null,
    dimensions: [],
    preview: null,
    snap: null,
    cursor: null,
    footFrom: 14,
  });
  const target = newCanvas();
  target.width = size.width * PICTURE_RATIO;
  target.height = (size.height + HEAD_HEIGHT) * PICTURE_RATIO;
  const context = contextOf(target);
  context.scale(PICTURE_RATIO, PICTURE_RATIO);
  context.fillStyle = palette.paper;
  context.fillRect(0, 0, size.width, size.height + HEAD_HEIGHT);
  const lay = (canvas: HTMLCanvasElement): void => context.drawImage(canvas, 0, HEAD_HEIGHT, size.width, size.height);
  if (request.fieldPlace === 'over') {
    lay(canvases.drawing);
    context.globalCompositeOperation = blendOver(palette.theme);
    lay(canvases.field);
    context.globalCompositeOperation = 'source-over';
  } else {
    lay(canvases.field);
    lay(canvases.drawing);
  }
  lay(canvases.marks);
  drawHead(context, request);
  return toPng(target);
}

/** A field laid over the drawing leaves it readable: paper-coloured places change nothing. */
function blendOver(theme: Palette['theme']): 'multiply' | 'screen' {
  return theme === 'light' ? 'multiply' : 'screen';
}

function drawHead(context: LayerContext, { job, palette, size, shown, madeAt }: PictureRequest): void {
  context.textBaseline = 'middle';
  context.textAlign = 'left';
  context.fillStyle = palette.ink;
  context.font = `650 15px ${SANS}`;
  context.fillText(job.title, 14, HEAD_HEIGHT / 2 - 1);
  context.font = `11.5px ${SANS}`;
  context.textAlign = 'right';
  context.fillStyle = palette.soft;
  context.fillText(headNote(shown.frame, madeAt), size.width - 14, HEAD_HEIGHT / 2 - 1);
}

/** "Hz at t = 3.42 ns, step 2964 · drawn 2026-03-01 14:05 UTC". */
function headNote(frame: FieldFrame | null, madeAt: Date): string {
  const stamp = `drawn ${madeAt.toISOString().slice(0, 16).replace('T', ' ')} UTC`;
  if (frame === null) return stamp;
  return `${frame.view} at t = ${formatQuantity(frame.timeSeconds, 'time', 4)}, step ${frame.step} · ${stamp}`;
}

function newCanvas(): HTMLCanvasElement {
  return document.createElement('canvas');
}

function toPng(canvas: HTMLCanvasElement): Promise<Blob> {
  return new Promise((resolve, reject) => {
    canvas.toBlob((blob) => {
      if (blob === null)
        reject(
          new Error(
            `a picture of ${canvas.width} by ${canvas.height} pixels is more than this browser can encode; make the window smaller`,
          ),
        );
      else resolve(blob);
    }, 'image/png');
  });
}
