// Owns the rulers along the top and the left of the canvas, with the marks that follow the cursor.
// Must not know the DOM, stores, or the job.
import type { XY } from '../../../model/job.ts';
import { makeRuler, ticksBetween } from '../ticks.ts';
import { RULER_LEFT, RULER_TOP, toSheet, type Box, boxToScreen } from '../viewport.ts';
import { SANS, type Surface } from './context.ts';

const MAJOR_TICK = 10;
const MINOR_TICK = 5;

/** `cursor` in sheet metres, null when the pointer is away. The sheet's own span is tinted on both rulers. */
export function drawRulers(surface: Surface, sheet: Box, cursor: XY | null): void {
  const { context, view, size, palette } = surface;
  context.fillStyle = palette.paper;
  context.fillRect(0, 0, size.width, RULER_TOP);
  context.fillRect(0, 0, RULER_LEFT, size.height);
  tintSpan(surface, sheet);
  const ruler = makeRuler(view.pixelsPerMetre);
  context.font = `10.5px ${SANS}`;
  context.fillStyle = palette.soft;
  context.strokeStyle = palette.soft;
  context.lineWidth = 0.75;
  context.setLineDash([]);
  const [left, top] = toSheet(view, RULER_LEFT, RULER_TOP);
  const [right, bottom] = toSheet(view, size.width, size.height);
  context.beginPath();
  context.textAlign = 'left';
  context.textBaseline = 'alphabetic';
  for (const tick of ticksBetween(ruler, left, right)) {
    const x = Math.round(view.originX + tick.at * view.pixelsPerMetre) + 0.5;
    context.moveTo(x, RULER_TOP - (tick.label === null ? MINOR_TICK : MAJOR_TICK));
    context.lineTo(x, RULER_TOP);
    if (tick.label !== null) context.fillText(tick.label, x + 4, RULER_TOP - 10);
  }
  context.textAlign = 'right';
  for (const tick of ticksBetween(ruler, bottom, top)) {
    const y = Math.round(view.originY - tick.at * view.pixelsPerMetre) + 0.5;
    if (y < RULER_TOP) continue;
    context.moveTo(RULER_LEFT - (tick.label === null ? MINOR_TICK : MAJOR_TICK), y);
    context.lineTo(RULER_LEFT, y);
    if (tick.label !== null && y > RULER_TOP + 14) context.fillText(tick.label, RULER_LEFT - 6, y - 4);
  }
  context.stroke();
  writeUnit(surface, ruler.unit.name);
  if (cursor !== null) markCursor(surface, cursor);
}

function tintSpan({ context, view, palette }: Surface, sheet: Box): void {
  const { x, y, width, height } = boxToScreen(view, sheet);
  context.fillStyle = palette.hair;
  const left = Math.max(x, RULER_LEFT);
  const top = Math.max(y, RULER_TOP);
  if (x + width > left) context.fillRect(left, RULER_TOP - 3, x + width - left, 3);
  if (y + height > top) context.fillRect(RULER_LEFT - 3, top, 3, y + height - top);
}

function writeUnit({ context, palette }: Surface, unit: string): void {
  context.fillStyle = palette.paper;
  context.fillRect(0, 0, RULER_LEFT, RULER_TOP);
  context.fillStyle = palette.soft;
  context.font = `600 10.5px ${SANS}`;
  context.textAlign = 'center';
  context.textBaseline = 'middle';
  context.fillText(unit, RULER_LEFT / 2, RULER_TOP / 2);
}

function markCursor({ context, view, palette }: Surface, cursor: XY): void {
  const x = view.originX + cursor[0] * view.pixelsPerMetre;
  const y = view.originY - cursor[1] * view.pixelsPerMetre;
  context.fillStyle = palette.accent;
  if (x >= RULER_LEFT) {
    context.beginPath();
    context.moveTo(x, RULER_TOP);
    context.lineTo(x - 4, RULER_TOP - 7);
    context.lineTo(x + 4, RULER_TOP - 7);
    context.closePath();
    context.fill();
  }
  if (y >= RULER_TOP) {
    context.beginPath();
    context.moveTo(RULER_LEFT, y);
    context.lineTo(RULER_LEFT - 7, y - 4);
    context.lineTo(RULER_LEFT - 7, y + 4);
    context.closePath();
    context.fill();
  }
}
