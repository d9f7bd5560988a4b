// Owns the way of live field frames from the run to the canvas, past React: the newest frame, who wants to hear of it.
// Must not know React components, workers, or how a frame is drawn.
import type { FieldFrame } from '../../workers/protocol.ts';

let newest: FieldFrame | null = null;
let limits = { width: 1200, height: 800 };
const listeners = new Set<(frame: FieldFrame | null) => void>();

/** The newest frame, or null before the first. */
export function latestFrame(): FieldFrame | null {
  return newest;
}

/** Calls `listener` with every new frame (null when there is none any more); the answer ends it. */
export function subscribeFrame(listener: (frame: FieldFrame | null) => void): () => void {
  listeners.add(listener);
  return () => void listeners.delete(listener);
}

export function publishFrame(frame: FieldFrame | null): void {
  newest = frame;
  for (const listener of listeners) listener(frame);
}

/** Largest frame worth sending: the device pixels the sheet is drawn with. The canvas sets it when it is resized. */
export function setFrameLimits(width: number, height: number): void {
  limits = { width: Math.max(16, Math.round(width)), height: Math.max(16, Math.round(height)) };
}

export function frameLimits(): { readonly width: number; readonly height: number } {
  return limits;
}
