// Owns the order in which layers are drawn: the field, the drawing, the marks.
// Must not know the DOM, stores, or how any layer looks.
import type { Job, ResolvedJob, XY } from '../../model/job.ts';
import { findMaterial } from '../../model/materials/library.ts';
import type { Surface } from './layers/context.ts';
import { driveBoxes, drawDrives } from './layers/drives-layer.ts';
import { drawEdges, sheetBox } from './layers/edges-layer.ts';
import { drawNames, drawParts } from './layers/parts-layer.ts';
import { drawProbes, probeBoxes } from './layers/probes-layer.ts';
import { drawRulers } from './layers/rulers-layer.ts';
import { drawScaleStrip, type FieldScale, type LegendEntry } from './layers/scale-layer.ts';
import { drawDimensions, drawHandles, drawMark, drawPreview, drawSnap, type PlacedDimension } from './layers/selection-layer.ts';
import type { Snap } from './snap.ts';
import { findPart } from './things.ts';
import type { Preview } from './tools/tool.ts';
import { boxToScreen } from './viewport.ts';

/** What of a part that runs off the sheet is still seen outside. */
const GHOST = 0.22;

/** Parts, drives, probes and edges, on their own transparent canvas. */
export function paintDrawing(surface: Surface, resolved: ResolvedJob): void {
  drawParts(surface, resolved.parts);
  ghostOutside(surface, resolved);
  drawEdges(surface, resolved.sheet);
  drawDrives(surface, resolved.drives, sheetBox(resolved.sheet), resolved.section);
  drawNames(surface, resolved.parts, [...driveBoxes(surface, resolved.drives), ...probeBoxes(surface, resolved.probes)]);
  drawProbes(surface, resolved.probes);
}

function ghostOutside({ context, view, size }: Surface, resolved: ResolvedJob): void {
  const { x, y, width, height } = boxToScreen(view, sheetBox(resolved.sheet));
  context.save();
  context.globalCompositeOperation = 'destination-out';
  context.globalAlpha = 1 - GHOST;
  context.fillStyle = '#000';
  context.beginPath();
  context.rect(0, 0, size.width, size.height);
  context.rect(x, y, width, height);
  context.fill('evenodd');
  context.restore();
}

export interface Marks {
  readonly job: Job;
  readonly resolved: ResolvedJob;
  readonly selection: readonly string[];
  readonly hovered: string | null;
  readonly dimensions: readonly PlacedDimension[];
  /** Handles show only while they can be taken. */
  readonly handles: boolean;
  readonly preview: Preview | null;
  readonly snap: Snap | null;
  readonly cursor: XY | null;
  readonly field: FieldScale | null;
  /** Pixels at the left of the foot that belong to the read-out. */
  readonly footFrom: number;
}

/** Everything that follows the hand, above the drawing. */
export function paintMarks(surface: Surface, marks: Marks): void {
  const { job, resolved, selection, hovered } = marks;
  if (hovered !== null && !selection.includes(hovered)) drawMark(surface, resolved, hovered, 'hovered');
  for (const id of selection) drawMark(surface, resolved, id, 'selected');
  drawDimensions(surface, marks.dimensions);
  const only = marks.handles && selection.length === 1 ? findPart(job, selection[0]) : null;
  if (only !== null) drawHandles(surface, only, job);
  if (marks.preview !== null) drawPreview(surface, marks.preview, job);
  if (marks.snap !== null) drawSnap(surface, marks.snap);
  drawRulers(surface, sheetBox(resolved.sheet), marks.cursor);
  drawScaleStrip(surface, makeLegend(job, resolved), marks.field, marks.footFrom);
}

/** Materials on the sheet, each once, in painting order. */
function makeLegend(job: Job, resolved: ResolvedJob): readonly LegendEntry[] {
  const entries = new Map<string, LegendEntry>();
  for (const part of resolved.parts) {
    const name = findMaterial(job, part.materialId)?.name ?? part.materialId;
    if (!entries.has(part.materialId)) entries.set(part.materialId, { name, medium: part.medium });
  }
  return [...entries.values()];
}
