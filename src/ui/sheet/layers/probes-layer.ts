// Owns how probes look: numbered flags.
// Must not know the DOM, stores, or what probes read.
import type { ResolvedJob } from '../../../model/job.ts';
import { toScreen } from '../viewport.ts';
import { SANS, strokeSegment, type ScreenBox, type Surface } from './context.ts';

const POLE_PIXELS = 28;
const FLAG_HEIGHT = 14;

export function drawProbes(surface: Surface, probes: ResolvedJob['probes']): void {
  probes.forEach((probe, index) => {
    const [x, y] = toScreen(surface.view, probe.at);
    drawFlag(surface, x, y, String(index + 1));
  });
}

/** Where the flags stand on the screen. */
export function probeBoxes({ view }: Surface, probes: ResolvedJob['probes']): ScreenBox[] {
  return probes.map((probe) => {
    const [x, y] = toScreen(view, probe.at);
    return { left: x - 4, right: x + 24, top: y - POLE_PIXELS - 2, bottom: y + 4 };
  });
}

function drawFlag({ context, palette }: Surface, x: number, y: number, number: string): void {
  const top = y - POLE_PIXELS;
  context.setLineDash([]);
  context.strokeStyle = palette.halo;
  context.lineWidth = 3.5;
  strokeSegment(context, [x, y], [x, top]);
  context.strokeStyle = palette.ink;
  context.lineWidth = 1.4;
  strokeSegment(context, [x, y], [x, top]);
  context.font = `700 10.5px ${SANS}`;
  const width = context.measureText(number).width + 15;
  context.fillStyle = palette.accent;
  context.beginPath();
  context.moveTo(x, top);
  context.lineTo(x + width, top);
  context.lineTo(x + width - 5, top + FLAG_HEIGHT / 2);
  context.lineTo(x + width, top + FLAG_HEIGHT);
  context.lineTo(x, top + FLAG_HEIGHT);
  context.closePath();
  context.fill();
  context.fillStyle = palette.accentInk;
  context.textAlign = 'left';
  context.textBaseline = 'middle';
  context.fillText(number, x + 5, top + FLAG_HEIGHT / 2 + 0.5);
  context.fillStyle = palette.ink;
  context.beginPath();
  context.arc(x, y, 3, 0, 2 * Math.PI);
  context.fill();
}
