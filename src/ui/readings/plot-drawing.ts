// Owns what is drawn into a plot besides its lines: the zone of the unknown, the unit, marks and cursors.
// Must not know React or what the numbers mean.
import type uPlot from 'uplot';
import { nearestIndex } from './nearest-index.ts';
import type { PlotContent } from './plot-content.ts';
import { axisUnit } from './scale-words.ts';

/** The zone under the floor is hatched: what lies there is not known. */
export function drawFloor(plot: uPlot, { floor, x }: PlotContent, colour: (name: string) => string): void {
  if (floor === null) return;
  const { ctx, bbox } = plot;
  const bottom = bbox.top + bbox.height;
  ctx.save();
  ctx.beginPath();
  let begun = false;
  let last = 0;
  for (let k = 0; k < x.length; k++) {
    const level = floor[k];
    if (level === undefined || level === null) continue;
    const px = plot.valToPos(x[k]!, 'x', true);
    const py = Math.min(bottom, plot.valToPos(level, 'y', true));
    if (begun) ctx.lineTo(px, py);
    else ctx.moveTo(px, bottom);
    if (!begun) ctx.lineTo(px, py);
    begun = true;
    last = px;
  }
  if (begun) {
    ctx.lineTo(last, bottom);
    ctx.closePath();
    ctx.clip();
    ctx.beginPath();
    ctx.rect(bbox.left, bbox.top, bbox.width, bbox.height);
    ctx.clip();
    ctx.strokeStyle = colour('--line');
    ctx.lineWidth = devicePixelRatio;
    ctx.beginPath();
    for (let s = bbox.left - bbox.height; s < bbox.left + bbox.width; s += 6 * devicePixelRatio) {
      ctx.moveTo(s, bottom);
      ctx.lineTo(s + bbox.height, bbox.top);
    }
    ctx.stroke();
  }
  ctx.restore();
}

export function drawUnit(plot: uPlot, { yUnit, yPrefixed }: PlotContent, colour: string, font: string): void {
  const { ctx, bbox } = plot;
  const { min = 0, max = 0 } = plot.scales['y'] ?? {};
  const unit = yPrefixed ? axisUnit(Math.max(Math.abs(min ?? 0), Math.abs(max ?? 0)), yUnit).unit : yUnit;
  ctx.save();
  ctx.fillStyle = colour;
  ctx.font = font.replace('11px', `${11 * devicePixelRatio}px`);
  ctx.textBaseline = 'top';
  ctx.textAlign = 'left';
  ctx.fillText(unit, bbox.left, bbox.top - 13 * devicePixelRatio);
  ctx.restore();
}

export function drawMarks(plot: uPlot, { marks }: PlotContent, colour: string): void {
  const { ctx, bbox } = plot;
  ctx.save();
  ctx.fillStyle = colour;
  for (const mark of marks) {
    const px = plot.valToPos(mark, 'x', true);
    if (px < bbox.left || px > bbox.left + bbox.width) continue;
    const s = 3.5 * devicePixelRatio;
    ctx.beginPath();
    ctx.moveTo(px, bbox.top + bbox.height - 2 * s);
    ctx.lineTo(px - s, bbox.top + bbox.height);
    ctx.lineTo(px + s, bbox.top + bbox.height);
    ctx.fill();
  }
  ctx.restore();
}

/** Cursor 1 is a whole line, cursor 2 a dashed one; dots where they meet the lines. */
export function drawCursors(plot: uPlot, { cursors, columns, lines, x }: PlotContent, colour: (name: string) => string): void {
  const { ctx, bbox } = plot;
  cursors.forEach((cursor, which) => {
    if (cursor === null || x.length === 0) return;
    const px = plot.valToPos(cursor, 'x', true);
    if (px < bbox.left - 1 || px > bbox.left + bbox.width + 1) return;
    ctx.save();
    ctx.strokeStyle = colour('--ink');
    ctx.lineWidth = devicePixelRatio;
    ctx.setLineDash(which === 0 ? [] : [4 * devicePixelRatio, 3 * devicePixelRatio]);
    ctx.beginPath();
    ctx.moveTo(px, bbox.top);
    ctx.lineTo(px, bbox.top + bbox.height);
    ctx.stroke();
    const k = nearestIndex(x, cursor);
    columns.forEach((column, n) => {
      const value = column[k];
      const line = lines[n];
      if (value === undefined || value === null || line === undefined) return;
      ctx.fillStyle = colour(line.colour);
      ctx.beginPath();
      ctx.arc(px, plot.valToPos(value, 'y', true), 3.5 * devicePixelRatio, 0, 2 * Math.PI);
      ctx.fill();
    });
    ctx.restore();
  });
}
