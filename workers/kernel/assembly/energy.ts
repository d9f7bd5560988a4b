// Owns the discrete energy of an image.
// Must not know how it is stepped.
import {
  H_ROWS,
  H_ROW_TABLE,
  H_STRIDE,
  H_U,
  H_VX,
  H_VY,
  LINKS,
  NODES,
  PLAIN,
  SPAN_BU,
  SPAN_BVX,
  SPAN_BVY,
  SPAN_COEFFICIENTS,
  SPAN_COLUMN,
  SPAN_COUNT,
  SPAN_KIND,
  SPAN_WORDS,
  WRAP_B,
  WRAP_FIRST,
  WRAP_LAST,
} from '../../../src/engine/layout';
import { word, offset, single } from './words';

// Energy of one cell: u^2/bu + vx(-)vx(+)/bvx + vy(-)vy(+)/bvy, conserved exactly by the lossless update.
// @ts-ignore: decorator
@inline function cellEnergy(u: usize, vx: usize, vy: usize, row: usize, bu: f64, bvx: f64, bvy: f64): f64 {
  const here = <f64>load<f32>(u);
  const x = <f64>load<f32>(vx);
  const y = <f64>load<f32>(vy);
  let sum = 0.0;
  if (bu > 0) sum += (here * here) / bu;
  if (bvx > 0) sum += x * (x / bvx + (here - <f64>load<f32>(u - row)));
  if (bvy > 0) sum += y * (y / bvy - (here - <f64>load<f32>(u - 4)));
  return sum;
}

/**
 * Discrete energy of the image at `base` in kernel units, double precision: the leapfrog invariant
 * sum(u^n u^n / bu) + sum(v^(n-1/2) v^(n+1/2) / bv), with v^(n-1/2) found from the last update.
 */
export function energy(base: usize): f64 {
  const row = <usize>word(base, H_STRIDE) << 2;
  const rows = word(base, H_ROWS);
  const u0 = base + offset(base, H_U);
  const vx0 = base + offset(base, H_VX);
  const vy0 = base + offset(base, H_VY);
  const table = base + offset(base, H_ROW_TABLE);
  let total = 0.0;
  for (let j = 1; j <= rows; j++) {
    const program = base + offset(table, j);
    let at = program + 4;
    let sum = 0.0;
    for (let n = load<i32>(program); n > 0; n--) {
      const first = (<usize>word(at, SPAN_COLUMN) << 2) + <usize>j * row;
      const bytes = <usize>word(at, SPAN_COUNT) << 2;
      const kind = word(at, SPAN_KIND);
      const c = base + offset(at, SPAN_COEFFICIENTS);
      // A scalar is an array that the index never enters.
      const evenU = kind == PLAIN || kind == LINKS;
      const evenV = kind == PLAIN || kind == NODES;
      const links = kind == LINKS ? c : c + bytes;
      const bu = evenU ? at + (<usize>SPAN_BU << 2) : c;
      const bvx = evenV ? at + (<usize>SPAN_BVX << 2) : links;
      const bvy = evenV ? at + (<usize>SPAN_BVY << 2) : links + bytes;
      for (let k: usize = 0; k < bytes; k += 4) {
        const p = first + k;
        const b = <f64>load<f32>(evenU ? bu : bu + k);
        const x = <f64>load<f32>(evenV ? bvx : bvx + k);
        const y = <f64>load<f32>(evenV ? bvy : bvy + k);
        sum += cellEnergy(u0 + p, vx0 + p, vy0 + p, row, b, x, y);
      }
      at += <usize>SPAN_WORDS << 2;
    }
    const firstColumn = <usize>word(at, WRAP_FIRST) << 2;
    if (firstColumn) {
      const lastColumn = <usize>word(at, WRAP_LAST) << 2;
      const p = <usize>j * row;
      const y = <f64>load<f32>(vy0 + p + firstColumn);
      const rise = <f64>load<f32>(u0 + p + firstColumn) - <f64>load<f32>(u0 + p + lastColumn);
      const b = <f64>single(at, WRAP_B);
      if (b > 0) sum += y * (y / b - rise);
    }
    total += sum;
  }
  return total;
}
