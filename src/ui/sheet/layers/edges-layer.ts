// Owns how the sheet's own edges look and what is written about them in the margin.
// Must not know the DOM, stores, or how edges are computed.
import type { EdgeKind, EdgeName, ResolvedJob, XY } from '../../../model/job.ts';
import { boxToScreen, type Box } from '../viewport.ts';
import { SANS, strokeSegment, type Surface } from './context.ts';

export const FADE_PIXELS = 22;

export const EDGE_NAMES: readonly EdgeName[] = ['left', 'right', 'bottom', 'top'];

const OPPOSITE: Record<EdgeName, EdgeName> = { left: 'right', right: 'left', bottom: 'top', top: 'bottom' };

export function edgeWords(edge: EdgeName, kind: EdgeKind): string {
  switch (kind) {
    case 'absorbing':
      return 'absorbing edge';
    case 'metal':
      return 'metal edge';
    case 'magnetic':
      return 'magnetic edge';
    case 'repeating':
      return `repeats at the ${OPPOSITE[edge]} edge`;
  }
}

export function sheetBox(sheet: ResolvedJob['sheet']): Box {
  const [x, y] = sheet.originMetres;
  return { left: -x, bottom: -y, right: sheet.widthMetres - x, top: sheet.heightMetres - y };
}

interface EdgeLine {
  readonly from: XY;
  readonly to: XY;
  /** Unit vector out of the sheet, screen pixels. */
  readonly out: XY;
}

function edgeLine(surface: Surface, box: Box, edge: EdgeName): EdgeLine {
  const { x, y, width, height } = boxToScreen(surface.view, box);
  switch (edge) {
    case 'left':
      return { from: [x, y], to: [x, y + height], out: [-1, 0] };
    case 'right':
      return { from: [x + width, y], to: [x + width, y + height], out: [1, 0] };
    case 'top':
      return { from: [x, y], to: [x + width, y], out: [0, -1] };
    case 'bottom':
      return { from: [x, y + height], to: [x + width, y + height], out: [0, 1] };
  }
}

export function drawEdges(surface: Surface, sheet: ResolvedJob['sheet']): void {
  const box = sheetBox(sheet);
  for (const edge of EDGE_NAMES) {
    const line = edgeLine(surface, box, edge);
    strokeEdge(surface, line, sheet.edges[edge]);
    writeEdge(surface, line, edge, sheet.edges[edge]);
  }
}

function strokeEdge(surface: Surface, { from, to, out }: EdgeLine, kind: EdgeKind): void {
  const { context, palette } = surface;
  const shifted = (by: number): [XY, XY] => [
    [from[0] + out[0] * by, from[1] + out[1] * by],
    [to[0] + out[0] * by, to[1] + out[1] * by],
  ];
  context.setLineDash([]);
  context.strokeStyle = palette.metal;
  switch (kind) {
    case 'absorbing':
      return;
    case 'metal':
      context.lineWidth = 1.6;
      strokeSegment(context, ...shifted(0.8));
      hatchOutside(surface, from, to, out);
      return;
    case 'magnetic':
      context.lineWidth = 1;
      strokeSegment(context, ...shifted(0.5));
      strokeSegment(context, ...shifted(4));
      return;
    case 'repeating':
      context.lineWidth = 1.2;
      context.setLineDash([14, 4, 2, 4]);
      strokeSegment(context, ...shifted(0.6));
      context.setLineDash([]);
  }
}

/** Short drafting strokes along the outer side of a metal edge, as ground is hatched. */
function hatchOutside({ context, view, size }: Surface, from: XY, to: XY, out: XY): void {
  const depth = 6;
  const horizontal = out[0] === 0;
  const [start, end] = horizontal ? [from[0], to[0]] : [from[1], to[1]];
  const limit = horizontal ? size.width : size.height;
  const anchor = horizontal ? view.originX : view.originY;
  const pitch = 7;
  context.lineWidth = 0.9;
  context.beginPath();
  const first = anchor + Math.ceil((Math.max(start, 0) - anchor) / pitch) * pitch;
  for (let s = first; s <= Math.min(end, limit); s += pitch) {
    if (horizontal) {
      context.moveTo(s, from[1] + out[1]);
      context.lineTo(s - depth, from[1] + out[1] * depth);
    } else {
      context.moveTo(from[0] + out[0], s);
      context.lineTo(from[0] + out[0] * depth, s - depth);
    }
  }
  context.stroke();
}

function writeEdge(surface: Surface, { from, to, out }: EdgeLine, edge: EdgeName, kind: EdgeKind): void {
  const { context, palette, size } = surface;
  const middleX = (Math.max(from[0], 40) + Math.min(to[0], size.width)) / 2;
  const middleY = (Math.max(from[1], 24) + Math.min(to[1], size.height)) / 2;
  context.save();
  // Beyond the fading field of an absorbing edge, beyond the hatch of a metal one.
  const aside = kind === 'absorbing' ? FADE_PIXELS + 6 : 17;
  context.translate(middleX + out[0] * aside, middleY + out[1] * aside);
  if (edge === 'left') context.rotate(-Math.PI / 2);
  if (edge === 'right') context.rotate(Math.PI / 2);
  context.font = `11px ${SANS}`;
  context.textAlign = 'center';
  context.textBaseline = 'middle';
  context.fillStyle = palette.soft;
  context.fillText(edgeWords(edge, kind), 0, 0);
  context.restore();
}
