// Owns the pictures of the field: a component sampled over the sheet as physical values.
// Must not know colours or canvases.
import type { FieldGeometry } from './plan.ts';

export type FrameQuantity = 'u' | 'x' | 'y' | 'in-plane magnitude' | 'u magnitude';

export interface SampledField {
  readonly width: number;
  readonly height: number;
  /** Row-major, bottom row first, V/m or A/m. */
  readonly values: Float32Array<ArrayBuffer>;
  readonly peak: number;
}

/**
 * Samples the sheet at every n-th unknown so that the picture is at most `maxWidth` by `maxHeight`. In-plane components are
 * brought to u by the mean of their two neighbours. `memory` views the run's image, offset 0 being its start.
 */
export function sampleField(
  memory: Float32Array,
  geometry: FieldGeometry,
  section: 'E out of plane' | 'H out of plane',
  quantity: FrameQuantity,
  maxWidth: number,
  maxHeight: number,
): SampledField {
  const columns = geometry.lastColumn - geometry.firstColumn + 1;
  const rows = geometry.lastRow - geometry.firstRow + 1;
  const stepX = Math.max(1, Math.ceil(columns / maxWidth));
  const stepY = Math.max(1, Math.ceil(rows / maxHeight));
  const width = Math.ceil(columns / stepX);
  const height = Math.ceil(rows / stepY);
  const values = new Float32Array(width * height);
  const { stride } = geometry;
  const u = geometry.uOffset >> 2;
  const vx = geometry.vxOffset >> 2;
  const vy = geometry.vyOffset >> 2;
  const sign = section === 'E out of plane' ? 0.5 : -0.5;
  const toX = sign / (geometry.vScale * geometry.dxMetres);
  const toY = sign / (geometry.vScale * geometry.dyMetres);
  const toU = 1 / geometry.uScale;
  let peak = 0;
  let at = 0;
  for (let b = 0; b < height; b++) {
    const row = Math.min(geometry.lastRow, geometry.firstRow + b * stepY + (stepY >> 1)) + 1;
    for (let a = 0; a < width; a++) {
      const p = row * stride + 4 + Math.min(geometry.lastColumn, geometry.firstColumn + a * stepX + (stepX >> 1));
      let value: number;
      if (quantity === 'u' || quantity === 'u magnitude') value = toU * memory[u + p]!;
      else {
        const x = toX * (memory[vx + p]! + memory[vx + p + stride]!);
        const y = toY * (memory[vy + p]! + memory[vy + p + 1]!);
        value = quantity === 'x' ? x : quantity === 'y' ? y : Math.sqrt(x * x + y * y);
      }
      if (quantity === 'u magnitude') value = Math.abs(value);
      values[at++] = value;
      const size = Math.abs(value);
      if (size > peak) peak = size;
    }
  }
  return { width, height, values, peak };
}
