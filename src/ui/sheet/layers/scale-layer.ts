// Owns the strip along the foot of the canvas: scale bar, legend of the materials on the sheet, colour scale with its unit.
// Must not know the DOM, stores, or how the field became colours.
import type { FieldView } from '../../../../workers/protocol.ts';
import { formatQuantity } from '../../../base/quantity.ts';
import type { Medium } from '../../../model/job.ts';
import { cssOfEntry, MAP_ENTRIES } from '../colour-map.ts';
import { isMagnitude, unitOf } from '../field-image.ts';
import { stepAtLeast } from '../ticks.ts';
import { FOOT_HEIGHT } from '../viewport.ts';
import { SANS, type Surface } from './context.ts';
import { tintOpacity } from './parts-layer.ts';

const COLOUR_BAR_WIDTH = 148;
const COLOUR_BAR_HEIGHT = 8;

export interface FieldScale {
  readonly view: FieldView;
  /** V/m or A/m at full colour. */
  readonly fullScale: number;
  readonly spanDb: number;
}

export interface LegendEntry {
  readonly name: string;
  readonly medium: Medium;
}

/** `from`: pixels on the left that belong to others. */
export function drawScaleStrip(surface: Surface, legend: readonly LegendEntry[], field: FieldScale | null, from: number): void {
  const { context, palette, size } = surface;
  const top = size.height - FOOT_HEIGHT;
  context.fillStyle = palette.paper;
  context.fillRect(0, top, size.width, FOOT_HEIGHT);
  const right = field === null ? size.width - 14 : drawColourScale(surface, field, top);
  let x = drawScaleBar(surface, from, top, right);
  context.textAlign = 'left';
  context.textBaseline = 'middle';
  for (const [k, entry] of legend.entries()) {
    context.font = `11px ${SANS}`;
    const label = legendLabel(entry);
    const width = 20 + context.measureText(label).width;
    const room = right - 16 - (k < legend.length - 1 ? 34 : 0);
    context.fillStyle = palette.soft;
    if (x + width > room) {
      if (x + 30 < right) context.fillText(`+ ${legend.length - k}`, x, top + FOOT_HEIGHT / 2 + 0.5);
      return;
    }
    drawSwatch(surface, entry.medium, x, top + FOOT_HEIGHT / 2 - 5);
    context.fillStyle = palette.soft;
    context.fillText(label, x + 17, top + FOOT_HEIGHT / 2 + 0.5);
    x += width + 14;
  }
}

export function legendLabel({ name, medium }: LegendEntry): string {
  if (medium.metal || medium.epsilonRelative <= 1.0001) return name;
  return `${name}, εr ${Number(medium.epsilonRelative.toPrecision(3))}`;
}

function drawSwatch({ context, palette }: Surface, medium: Medium, x: number, y: number): void {
  context.setLineDash([]);
  context.lineWidth = 1;
  context.fillStyle = medium.metal ? palette.paper : palette.sheet;
  context.fillRect(x, y, 11, 11);
  context.strokeStyle = palette.metal;
  if (medium.metal) {
    context.save();
    context.beginPath();
    context.rect(x, y, 11, 11);
    context.clip();
    context.beginPath();
    for (let s = -11; s < 22; s += 4.5) {
      context.moveTo(x + s, y + 11);
      context.lineTo(x + s + 11, y);
    }
    context.stroke();
    context.restore();
  } else {
    context.fillStyle = `rgb(${palette.dielectric} / ${tintOpacity(medium.epsilonRelative).toFixed(3)})`;
    context.fillRect(x, y, 11, 11);
    context.strokeStyle = palette.dielectricLine;
  }
  context.strokeRect(x + 0.5, y + 0.5, 10, 10);
}

/** A bar of a round length, about 90 pixels long; returns where the next thing may stand. */
function drawScaleBar({ context, palette, view }: Surface, from: number, top: number, limit: number): number {
  const metres = stepAtLeast(60 / view.pixelsPerMetre);
  const length = metres * view.pixelsPerMetre;
  const label = formatQuantity(metres, 'length', 3);
  context.font = `11px ${SANS}`;
  const end = from + length + 8 + context.measureText(label).width;
  if (end > limit - 16) return from;
  const y = top + FOOT_HEIGHT / 2;
  context.strokeStyle = palette.ink;
  context.lineWidth = 1.2;
  context.setLineDash([]);
  context.beginPath();
  context.moveTo(from, y - 4);
  context.lineTo(from, y + 4);
  context.moveTo(from, y);
  context.lineTo(from + length, y);
  context.moveTo(from + length, y - 4);
  context.lineTo(from + length, y + 4);
  context.stroke();
  context.textAlign = 'left';
  context.textBaseline = 'middle';
  context.fillStyle = palette.ink;
  context.fillText(label, from + length + 8, y + 0.5);
  return end + 22;
}

/** The bar with its ends written out; returns its left end. */
function drawColourScale(surface: Surface, field: FieldScale, top: number): number {
  const { context, palette, size } = surface;
  const { low, high, title } = scaleWords(field);
  const map = isMagnitude(field.view) ? palette.sequential : palette.diverging;
  const y = top + FOOT_HEIGHT / 2;
  context.font = `11px ${SANS}`;
  context.textBaseline = 'middle';
  context.fillStyle = palette.soft;
  context.textAlign = 'right';
  const highWidth = context.measureText(high).width;
  context.fillText(high, size.width - 14, y + 0.5);
  const barRight = size.width - 14 - highWidth - 8;
  const barLeft = barRight - COLOUR_BAR_WIDTH;
  for (let x = 0; x < COLOUR_BAR_WIDTH; x++) {
    context.fillStyle = cssOfEntry(map, Math.round((x / (COLOUR_BAR_WIDTH - 1)) * (MAP_ENTRIES - 1)));
    context.fillRect(barLeft + x, y - COLOUR_BAR_HEIGHT / 2, 1.5, COLOUR_BAR_HEIGHT);
  }
  context.strokeStyle = palette.line;
  context.lineWidth = 1;
  context.setLineDash([]);
  context.strokeRect(barLeft - 0.5, y - COLOUR_BAR_HEIGHT / 2 - 0.5, COLOUR_BAR_WIDTH + 1, COLOUR_BAR_HEIGHT + 1);
  context.fillStyle = palette.soft;
  context.fillText(low, barLeft - 8, y + 0.5);
  const lowWidth = context.measureText(low).width;
  context.font = `600 11px ${SANS}`;
  context.fillStyle = palette.ink;
  context.fillText(title, barLeft - lowWidth - 18, y + 0.5);
  return barLeft - lowWidth - 18 - context.measureText(title).width;
}

export function scaleWords(field: FieldScale): { low: string; high: string; title: string } {
  const value = formatField(field.fullScale, field.view);
  if (isMagnitude(field.view)) return { low: `−${field.spanDb}`, high: `0 dB re ${value}`, title: field.view };
  return { low: `−${value.split(' ')[0] ?? value}`, high: `+${value}`, title: field.view };
}

/** "1.25 mA/m", "38 V/m". */
export function formatField(value: number, view: FieldView): string {
  return unitOf(view) === 'V/m' ? formatQuantity(value, 'field', 3) : `${formatQuantity(value, 'current', 3)}/m`;
}
