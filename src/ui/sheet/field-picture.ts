// Owns the small picture that a frame becomes, and the automatic scale from frame to frame.
// Must not know stores, React, or where the picture is laid.
import type { FieldFrame, FieldView } from '../../../workers/protocol.ts';
import { followLevel, isMagnitude, paintComponentInto, paintDecibelsInto, strongLevel } from './field-image.ts';
import type { FieldPicture } from './layers/field-layer.ts';
import type { Palette } from './palette.ts';

export interface ScaleMemory {
  readonly view: FieldView;
  readonly step: number;
  readonly atRest: boolean;
  readonly scale: number;
  /** Largest level since the run began. */
  readonly largest: number;
}

/** Below this share of the run's largest level the automatic scale stays: rounding noise is not blown up to full colour. */
const LEAST_SHARE = 1e-4;

/**
 * Automatic scale after one more frame. While the run goes on it follows without flicker; at rest it fits the frame
 * shown, so that a decayed field is still seen. A new run or another component starts afresh.
 */
export function rememberScale(memory: ScaleMemory | null, frame: FieldFrame, atRest: boolean): ScaleMemory {
  const same = memory !== null && memory.view === frame.view && memory.step === frame.step && memory.atRest === atRest;
  if (same) return memory;
  const level = strongLevel(frame);
  const now = { view: frame.view, step: frame.step, atRest };
  if (memory === null || memory.view !== frame.view || frame.step < memory.step || memory.scale === 0) {
    return { ...now, scale: level, largest: level };
  }
  const largest = Math.max(memory.largest, level);
  const followed = atRest ? level : followLevel(memory.scale, level);
  return { ...now, scale: Math.max(followed, LEAST_SHARE * largest), largest };
}

export interface FieldPainter {
  /** Redraws the picture from a frame; null without one. */
  paint(frame: FieldFrame | null, palette: Palette, fullScale: number, spanDb: number): FieldPicture | null;
}

/** Keeps one canvas of the frame's size; frames may lie in shared memory, ImageData may not, so pixels are our own. */
export function makeFieldPainter(): FieldPainter {
  const canvas = document.createElement('canvas');
  const context = canvas.getContext('2d');
  let image: ImageData | null = null;
  let pixels = new Uint32Array(0);
  return {
    paint(frame, palette, fullScale, spanDb) {
      if (frame === null || context === null) return null;
      if (image === null || image.width !== frame.width || image.height !== frame.height) {
        canvas.width = frame.width;
        canvas.height = frame.height;
        image = new ImageData(frame.width, frame.height);
        pixels = new Uint32Array(image.data.buffer);
      }
      if (isMagnitude(frame.view)) paintDecibelsInto(pixels, frame, palette.sequential, fullScale, spanDb);
      else paintComponentInto(pixels, frame, palette.diverging, fullScale);
      context.putImageData(image, 0, 0);
      return { image: canvas, width: frame.width, height: frame.height };
    },
  };
}
