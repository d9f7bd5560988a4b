// Owns how drives look: the front of a plane wave with its direction of travel, the ring of a line current.
// Must not know the DOM, stores, or how waves are launched.
import type { ResolvedDrive, Section, XY } from '../../../model/job.ts';
import { toScreen, type Box } from '../viewport.ts';
import { haloText, SANS, strokeArrowHead, strokeSegment, type ScreenBox, type Surface } from './context.ts';

/** The front stands this far into the sheet, as a fraction of the way the wave goes across it. */
const FRONT_DEPTH = 0.07;

const ARROW_PIXELS = 26;
const NAME_FONT = `500 11px ${SANS}`;
export const LINE_CURRENT_RADIUS_PIXELS = 8;

/** The line on which the front of a plane wave is drawn: across the direction of travel, just inside the entering side. */
export function planeWaveFront(sheet: Box, angleRadians: number): readonly [XY, XY] {
  const direction: XY = [Math.cos(angleRadians), Math.sin(angleRadians)];
  const corners: readonly XY[] = [
    [sheet.left, sheet.bottom],
    [sheet.right, sheet.bottom],
    [sheet.right, sheet.top],
    [sheet.left, sheet.top],
  ];
  const along = corners.map((corner) => corner[0] * direction[0] + corner[1] * direction[1]);
  const least = Math.min(...along);
  const level = least + FRONT_DEPTH * (Math.max(...along) - least);
  const crossings: XY[] = [];
  corners.forEach((from, k) => {
    const to = corners[(k + 1) % 4] ?? from;
    const [a, b] = [along[k] ?? 0, along[(k + 1) % 4] ?? 0];
    if (a < level === b < level) return;
    const t = (level - a) / (b - a);
    crossings.push([from[0] + (to[0] - from[0]) * t, from[1] + (to[1] - from[1]) * t]);
  });
  return [crossings[0] ?? [sheet.left, sheet.bottom], crossings[1] ?? [sheet.left, sheet.top]];
}

export function drawDrives(surface: Surface, drives: readonly ResolvedDrive[], sheet: Box, section: Section): void {
  for (const drive of drives) {
    if (drive.kind === 'plane wave') drawPlaneWave(surface, drive, sheet);
    else drawLineCurrent(surface, drive, section);
  }
}

function drawPlaneWave(surface: Surface, drive: ResolvedDrive & { kind: 'plane wave' }, sheet: Box): void {
  const { context, palette, view } = surface;
  const [fromMetres, toMetres] = planeWaveFront(sheet, drive.angleRadians);
  const [from, to] = [toScreen(view, fromMetres), toScreen(view, toMetres)];
  const angle = -drive.angleRadians;
  const arrow: XY = [Math.cos(angle) * ARROW_PIXELS, Math.sin(angle) * ARROW_PIXELS];
  const strokes = (): void => {
    context.setLineDash([10, 5]);
    strokeSegment(context, from, to);
    context.setLineDash([]);
    for (const t of [1 / 6, 1 / 2, 5 / 6]) {
      const foot: XY = [from[0] + (to[0] - from[0]) * t, from[1] + (to[1] - from[1]) * t];
      const tip: XY = [foot[0] + arrow[0], foot[1] + arrow[1]];
      strokeSegment(context, foot, tip);
      strokeArrowHead(context, tip, angle, 8);
    }
  };
  context.lineCap = 'butt';
  context.strokeStyle = palette.halo;
  context.lineWidth = 3;
  strokes();
  context.strokeStyle = palette.ink;
  context.lineWidth = 1.1;
  strokes();
}

/** A dot in the ring: the current comes out of the plane; a cross: into it. A magnetic current has a second ring. */
function drawLineCurrent(surface: Surface, drive: ResolvedDrive & { kind: 'line current' }, section: Section): void {
  const { context, palette, view } = surface;
  const [x, y] = toScreen(view, drive.at);
  const radius = LINE_CURRENT_RADIUS_PIXELS;
  context.lineWidth = 1.4;
  context.setLineDash([]);
  context.strokeStyle = palette.ink;
  context.fillStyle = palette.sheet;
  disc(surface, x, y, radius);
  context.stroke();
  if (section === 'H out of plane') {
    context.lineWidth = 0.9;
    context.beginPath();
    context.arc(x, y, radius + 3, 0, 2 * Math.PI);
    context.stroke();
  }
  if (drive.amplitude >= 0) {
    context.fillStyle = palette.ink;
    disc(surface, x, y, 2.4);
  } else {
    const arm = radius * Math.SQRT1_2;
    strokeSegment(context, [x - arm, y - arm], [x + arm, y + arm]);
    strokeSegment(context, [x - arm, y + arm], [x + arm, y - arm]);
  }
  context.font = NAME_FONT;
  context.textAlign = 'left';
  context.textBaseline = 'middle';
  haloText(surface, drive.name, x + radius + 7, y, palette.ink);
}

function disc({ context }: Surface, x: number, y: number, radius: number): void {
  context.beginPath();
  context.arc(x, y, radius, 0, 2 * Math.PI);
  context.fill();
}

/** Where line currents and their names stand on the screen. */
export function driveBoxes({ context, view }: Surface, drives: readonly ResolvedDrive[]): ScreenBox[] {
  context.font = NAME_FONT;
  return drives.flatMap((drive) => {
    if (drive.kind === 'plane wave') return [];
    const [x, y] = toScreen(view, drive.at);
    const reach = LINE_CURRENT_RADIUS_PIXELS + 3;
    const right = x + LINE_CURRENT_RADIUS_PIXELS + 7 + context.measureText(drive.name).width;
    return [{ left: x - reach, right, top: y - reach, bottom: y + reach }];
  });
}
