// Owns telling a wheel from a pad: whether a wheel event means zooming or panning.
// Must not know the DOM beyond the numbers of the event, stores, or the viewport.

export interface WheelReading {
  readonly deltaX: number;
  readonly deltaY: number;
  /** 0 pixels, 1 lines, 2 pages. */
  readonly deltaMode: number;
  /** Set by browsers while two fingers pinch on a pad, and by the key itself. */
  readonly ctrl: boolean;
  readonly shift: boolean;
}

export type WheelMeaning =
  { readonly kind: 'zoom'; readonly factor: number } | { readonly kind: 'pan'; readonly dx: number; readonly dy: number };

const PIXELS_PER_LINE = 36;

/** A notch of a mouse wheel is a whole number of at least this many pixels, straight up or down. */
const NOTCH_PIXELS = 48;

/** Pads move in small steps and in both directions: they pan. A mouse wheel zooms; with Shift it pans sideways. */
export function readWheel(wheel: WheelReading): WheelMeaning {
  const scale = wheel.deltaMode === 0 ? 1 : PIXELS_PER_LINE;
  const [dx, dy] = [wheel.deltaX * scale, wheel.deltaY * scale];
  if (wheel.ctrl) return { kind: 'zoom', factor: Math.exp(-clampStep(dy, 60) * 0.01) };
  if (wheel.shift) return { kind: 'pan', dx: -(dx === 0 ? dy : dx), dy: 0 };
  const notch = wheel.deltaMode !== 0 || (dx === 0 && Math.abs(dy) >= NOTCH_PIXELS && Number.isInteger(dy));
  if (notch) return { kind: 'zoom', factor: Math.exp(-clampStep(dy, 240) * 0.0016) };
  return { kind: 'pan', dx: -dx, dy: -dy };
}

function clampStep(value: number, limit: number): number {
  return Math.min(limit, Math.max(-limit, value));
}
