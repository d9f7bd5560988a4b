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
  const columnOf = Int32Array.from(
    { length: width },
    (_, a) => 4 + Math.min(geometry.lastColumn, geometry.firstColumn + a * stepX + (stepX >> 1)),
  );
  const sampleRow = rowSampler(memory, geometry, section, quantity, columnOf);
  let peak = 0;
  for (let b = 0; b < height; b++) {
    const row = Math.min(geometry.lastRow, geometry.firstRow + b * stepY + (stepY >> 1)) + 1;
    peak = Math.max(peak, sampleRow(values, b * width, row * geometry.stride));
  }
  return { width, height, values, peak };
}

/** Writes one row of samples and returns its largest magnitude. One tight loop a quantity: 30 pictures a second must cost little. */
type RowSampler = (values: Float32Array, at: number, rowStart: number) => number;

function rowSampler(
  memory: Float32Array,
  geometry: FieldGeometry,
  section: 'E out of plane' | 'H out of plane',
  quantity: FrameQuantity,
  columnOf: Int32Array,
): RowSampler {
  const { stride } = geometry;
  const sign = section === 'E out of plane' ? 0.5 : -0.5;
  const toX = sign / (geometry.vScale * geometry.dxMetres);
  const toY = sign / (geometry.vScale * geometry.dyMetres);
  const count = columnOf.length;
  switch (quantity) {
    case 'u':
      return pairSampler(memory, geometry.uOffset >> 2, 0, 0.5 / geometry.uScale, columnOf);
    case 'x':
      return pairSampler(memory, geometry.vxOffset >> 2, stride, toX, columnOf);
    case 'y':
      return pairSampler(memory, geometry.vyOffset >> 2, 1, toY, columnOf);
    case 'u magnitude': {
      const signed = pairSampler(memory, geometry.uOffset >> 2, 0, 0.5 / geometry.uScale, columnOf);
      return (values, at, rowStart) => {
        const peak = signed(values, at, rowStart);
        for (let k = at; k < at + count; k++) values[k] = Math.abs(values[k]!);
        return peak;
      };
    }
    case 'in-plane magnitude': {
      const vx = geometry.vxOffset >> 2;
      const vy = geometry.vyOffset >> 2;
      return (values, at, rowStart) => {
        let peak = 0;
        for (let k = 0; k < count; k++) {
          const p = rowStart + columnOf[k]!;
          const x = toX * (memory[vx + p]! + memory[vx + p + stride]!);
          const y = toY * (memory[vy + p]! + memory[vy + p + 1]!);
          const value = Math.sqrt(x * x + y * y);
          values[at + k] = value;
          if (value > peak) peak = value;
        }
        return peak;
      };
    }
  }
}

/** Scaled sum of a value and its neighbour `apart` floats on; apart 0 doubles the value itself. */
function pairSampler(memory: Float32Array, field: number, apart: number, scale: number, columnOf: Int32Array): RowSampler {
  const count = columnOf.length;
  return (values, at, rowStart) => {
    let low = 0;
    let high = 0;
    const start = field + rowStart;
    for (let k = 0; k < count; k++) {
      const p = start + columnOf[k]!;
      const value = scale * (memory[p]! + memory[p + apart]!);
      values[at + k] = value;
      if (value > high) high = value;
      else if (value < low) low = value;
    }
    return Math.max(high, -low);
  };
}
