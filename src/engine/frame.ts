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

/** Rows of neighbouring unknowns, sampled faster than by the loops here. Places count floats from the start of the image. */
export interface RowSampling {
  /** Most samples in a row. */
  readonly most: number;
  /** scale * (m[first + k] + m[first + apart + k]) into `values`; returns the largest magnitude. */
  pairs(values: Float32Array, at: number, count: number, first: number, apart: number, scale: number): number;
  /** The length of the vector of two such sums, `scales` being those of x and y. */
  magnitudes(
    values: Float32Array,
    at: number,
    count: number,
    x: { readonly first: number; readonly apart: number },
    y: { readonly first: number; readonly apart: number },
    scales: readonly [x: number, y: number],
  ): number;
}

/**
 * Samples the sheet at every n-th unknown so that the picture is at most `maxWidth` by `maxHeight`. In-plane components are
 * brought to u by the mean of their two neighbours. `memory` views the run's image, offset 0 being its start; `rows` is used
 * where no column is left out.
 */
export function sampleField(
  memory: Float32Array,
  geometry: FieldGeometry,
  section: 'E out of plane' | 'H out of plane',
  quantity: FrameQuantity,
  maxWidth: number,
  maxHeight: number,
  rows: RowSampling | null = null,
): SampledField {
  const columns = geometry.lastColumn - geometry.firstColumn + 1;
  const rowCount = geometry.lastRow - geometry.firstRow + 1;
  const stepX = Math.max(1, Math.ceil(columns / maxWidth));
  const stepY = Math.max(1, Math.ceil(rowCount / maxHeight));
  const width = Math.ceil(columns / stepX);
  const height = Math.ceil(rowCount / stepY);
  const values = new Float32Array(width * height);
  const columnOf = Int32Array.from(
    { length: width },
    (_, a) => 4 + Math.min(geometry.lastColumn, geometry.firstColumn + a * stepX + (stepX >> 1)),
  );
  const sampleRow =
    rows !== null && stepX === 1 && width <= rows.most
      ? wholeRowSampler(rows, geometry, section, quantity, width)
      : rowSampler(memory, geometry, section, quantity, columnOf);
  let peak = 0;
  for (let b = 0; b < height; b++) {
    const row = Math.min(geometry.lastRow, geometry.firstRow + b * stepY + (stepY >> 1)) + 1;
    peak = Math.max(peak, sampleRow(values, b * width, row * geometry.stride));
  }
  return { width, height, values, peak };
}

/** Writes one row of samples and returns its largest magnitude. One tight loop a quantity: 30 pictures a second must cost little. */
type RowSampler = (values: Float32Array, at: number, rowStart: number) => number;

/** Half of what brings a sum of two in-plane unknowns to physical units. */
function halfScales(geometry: FieldGeometry, section: 'E out of plane' | 'H out of plane'): [toX: number, toY: number] {
  const sign = section === 'E out of plane' ? 0.5 : -0.5;
  return [sign / (geometry.vScale * geometry.dxMetres), sign / (geometry.vScale * geometry.dyMetres)];
}

function wholeRowSampler(
  rows: RowSampling,
  geometry: FieldGeometry,
  section: 'E out of plane' | 'H out of plane',
  quantity: FrameQuantity,
  count: number,
): RowSampler {
  const { stride } = geometry;
  const [toX, toY] = halfScales(geometry, section);
  const first = 4 + geometry.firstColumn;
  const [u, vx, vy] = [geometry.uOffset, geometry.vxOffset, geometry.vyOffset].map((offset) => (offset >> 2) + first) as [
    number,
    number,
    number,
  ];
  const toU = 0.5 / geometry.uScale;
  switch (quantity) {
    case 'u':
      return (values, at, start) => rows.pairs(values, at, count, u + start, 0, toU);
    case 'x':
      return (values, at, start) => rows.pairs(values, at, count, vx + start, stride, toX);
    case 'y':
      return (values, at, start) => rows.pairs(values, at, count, vy + start, 1, toY);
    case 'u magnitude':
      return (values, at, start) => {
        const own = { first: u + start, apart: 0 };
        return rows.magnitudes(values, at, count, own, own, [toU, 0]);
      };
    case 'in-plane magnitude':
      return (values, at, start) =>
        rows.magnitudes(values, at, count, { first: vx + start, apart: stride }, { first: vy + start, apart: 1 }, [toX, toY]);
  }
}

function rowSampler(
  memory: Float32Array,
  geometry: FieldGeometry,
  section: 'E out of plane' | 'H out of plane',
  quantity: FrameQuantity,
  columnOf: Int32Array,
): RowSampler {
  const { stride } = geometry;
  const [toX, toY] = halfScales(geometry, section);
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
