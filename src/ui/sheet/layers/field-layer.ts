// Owns where and how the picture of the field is laid on the sheet, and its fading into absorbing edges.
// Must not know the DOM beyond an image source, stores, or how values became pixels.
import type { EdgeName, ResolvedJob } from '../../../model/job.ts';
import { boxToScreen } from '../viewport.ts';
import type { Surface } from './context.ts';
import { EDGE_NAMES, FADE_PIXELS, sheetBox } from './edges-layer.ts';

/** A picture of the field, one pixel per sample, top row first. */
export interface FieldPicture {
  readonly image: CanvasImageSource;
  readonly width: number;
  readonly height: number;
}

/** The field stretched over the sheet by bilinear interpolation; without a picture the bare sheet. */
export function drawField(surface: Surface, sheet: ResolvedJob['sheet'], picture: FieldPicture | null): void {
  const { context, palette, view } = surface;
  const { x, y, width, height } = boxToScreen(view, sheetBox(sheet));
  if (picture === null) {
    context.fillStyle = palette.sheet;
    context.fillRect(x, y, width, height);
  } else {
    context.imageSmoothingEnabled = true;
    context.imageSmoothingQuality = 'low';
    context.drawImage(picture.image, x, y, width, height);
  }
  for (const edge of EDGE_NAMES) if (sheet.edges[edge] === 'absorbing') fadeOut(surface, { x, y, width, height }, edge, picture);
  fadeCorners(surface, sheet.edges, { x, y, width, height }, picture);
}

/** Where two absorbing edges meet, the corner of the field runs on and fades too. */
function fadeCorners(surface: Surface, edges: ResolvedJob['sheet']['edges'], sheet: Rect, picture: FieldPicture | null): void {
  const { context, palette } = surface;
  for (const across of ['left', 'right'] as const) {
    for (const up of ['top', 'bottom'] as const) {
      if (edges[across] !== 'absorbing' || edges[up] !== 'absorbing') continue;
      const cornerX = across === 'left' ? sheet.x : sheet.x + sheet.width;
      const cornerY = up === 'top' ? sheet.y : sheet.y + sheet.height;
      const x = across === 'left' ? cornerX - FADE_PIXELS : cornerX;
      const y = up === 'top' ? cornerY - FADE_PIXELS : cornerY;
      if (picture === null) {
        context.fillStyle = palette.sheet;
        context.fillRect(x, y, FADE_PIXELS, FADE_PIXELS);
      } else {
        const [fromX, fromY] = [across === 'left' ? 0 : picture.width - 1, up === 'top' ? 0 : picture.height - 1];
        context.drawImage(picture.image, fromX, fromY, 1, 1, x, y, FADE_PIXELS, FADE_PIXELS);
      }
      const gradient = context.createRadialGradient(cornerX, cornerY, 0, cornerX, cornerY, FADE_PIXELS);
      gradient.addColorStop(0, palette.paperClear);
      gradient.addColorStop(1, palette.paper);
      context.fillStyle = gradient;
      context.fillRect(x, y, FADE_PIXELS, FADE_PIXELS);
    }
  }
}

type Rect = { readonly x: number; readonly y: number; readonly width: number; readonly height: number };

/** Outside an absorbing edge the outermost row of the field runs on and fades into the paper. */
function fadeOut(surface: Surface, sheet: Rect, edge: EdgeName, picture: FieldPicture | null): void {
  const { context, palette } = surface;
  const strip = fadeStrip(sheet, edge);
  if (picture === null) {
    context.fillStyle = palette.sheet;
    context.fillRect(strip.x, strip.y, strip.width, strip.height);
  } else {
    const horizontal = edge === 'left' || edge === 'right';
    const from = {
      x: edge === 'right' ? picture.width - 1 : 0,
      y: edge === 'bottom' ? picture.height - 1 : 0,
      width: horizontal ? 1 : picture.width,
      height: horizontal ? picture.height : 1,
    };
    context.drawImage(picture.image, from.x, from.y, from.width, from.height, strip.x, strip.y, strip.width, strip.height);
  }
  const [fromX, toX] =
    edge === 'left' ? [strip.x + strip.width, strip.x] : edge === 'right' ? [strip.x, strip.x + strip.width] : [0, 0];
  const [fromY, toY] =
    edge === 'top' ? [strip.y + strip.height, strip.y] : edge === 'bottom' ? [strip.y, strip.y + strip.height] : [0, 0];
  const gradient = context.createLinearGradient(fromX, fromY, toX, toY);
  gradient.addColorStop(0, palette.paperClear);
  gradient.addColorStop(1, palette.paper);
  context.fillStyle = gradient;
  context.fillRect(strip.x, strip.y, strip.width, strip.height);
}

function fadeStrip({ x, y, width, height }: Rect, edge: EdgeName): Rect {
  switch (edge) {
    case 'left':
      return { x: x - FADE_PIXELS, y, width: FADE_PIXELS, height };
    case 'right':
      return { x: x + width, y, width: FADE_PIXELS, height };
    case 'top':
      return { x, y: y - FADE_PIXELS, width, height: FADE_PIXELS };
    case 'bottom':
      return { x, y: y + height, width, height: FADE_PIXELS };
  }
}
