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

// @ts-ignore: decorator
@inline function lower(four: v128): v128 {
  return f64x2.promote_low_f32x4(four);
}
// @ts-ignore: decorator
@inline function upper(four: v128): v128 {
  return f64x2.promote_low_f32x4(v128.shuffle<f32>(four, four, 2, 3, 2, 3));
}

// 1 / b, and 0 where b is 0: an unknown that is held still has no energy.
// @ts-ignore: decorator
@inline function inverse(b: v128): v128 {
  return v128.and(f64x2.gt(b, f64x2.splat(0)), f64x2.div(f64x2.splat(1), b));
}

// Energy of two cells: u^2/bu + vx(-)vx(+)/bvx + vy(-)vy(+)/bvy, conserved exactly by the lossless update. v(-) is found from
// the last update: x(-) = x + bvx (u - below), y(-) = y - bvy (u - left). iu, ix, iy are the inverses.
// @ts-ignore: decorator
@inline function pairEnergy(u: v128, x: v128, y: v128, below: v128, left: v128, bvx: v128, bvy: v128, iu: v128, ix: v128, iy: v128): v128 {
  const ofU = f64x2.mul(f64x2.mul(u, u), iu);
  const ofX = f64x2.mul(f64x2.mul(x, ix), f64x2.add(x, f64x2.mul(bvx, f64x2.sub(u, below))));
  const ofY = f64x2.mul(f64x2.mul(y, iy), f64x2.sub(y, f64x2.mul(bvy, f64x2.sub(u, left))));
  return f64x2.add(ofU, f64x2.add(ofX, ofY));
}

// Coefficients are scalars (of the span) where they are even, else arrays. The flags are known at compile time.
// @ts-ignore: decorator
@inline function spanEnergy(
  u: usize,
  vx: usize,
  vy: usize,
  row: usize,
  bytes: usize,
  bu: usize,
  bvx: usize,
  bvy: usize,
  evenU: bool,
  evenV: bool,
): f64 {
  let sum = f64x2.splat(0);
  const allX = f64x2.splat(<f64>load<f32>(bvx));
  const allY = f64x2.splat(<f64>load<f32>(bvy));
  const ofAllU = inverse(f64x2.splat(<f64>load<f32>(bu)));
  const ofAllX = inverse(allX);
  const ofAllY = inverse(allY);
  for (let k: usize = 0; k < bytes; k += 16) {
    const here = v128.load(u + k);
    const x = v128.load(vx + k);
    const y = v128.load(vy + k);
    const below = v128.load(u + k - row);
    const left = v128.load(u + k - 4);
    const b = evenU ? here : v128.load(bu + k);
    const bx = evenV ? here : v128.load(bvx + k);
    const by = evenV ? here : v128.load(bvy + k);
    const lowX = evenV ? allX : lower(bx);
    const lowY = evenV ? allY : lower(by);
    const low = pairEnergy(
      lower(here),
      lower(x),
      lower(y),
      lower(below),
      lower(left),
      lowX,
      lowY,
      evenU ? ofAllU : inverse(lower(b)),
      evenV ? ofAllX : inverse(lowX),
      evenV ? ofAllY : inverse(lowY),
    );
    const highX = evenV ? allX : upper(bx);
    const highY = evenV ? allY : upper(by);
    const high = pairEnergy(
      upper(here),
      upper(x),
      upper(y),
      upper(below),
      upper(left),
      highX,
      highY,
      evenU ? ofAllU : inverse(upper(b)),
      evenV ? ofAllX : inverse(highX),
      evenV ? ofAllY : inverse(highY),
    );
    sum = f64x2.add(sum, f64x2.add(low, high));
  }
  return f64x2.extract_lane(sum, 0) + f64x2.extract_lane(sum, 1);
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
      const bu = at + (<usize>SPAN_BU << 2);
      const bvx = at + (<usize>SPAN_BVX << 2);
      const bvy = at + (<usize>SPAN_BVY << 2);
      const u = u0 + first;
      const vx = vx0 + first;
      const vy = vy0 + first;
      if (kind == PLAIN) sum += spanEnergy(u, vx, vy, row, bytes, bu, bvx, bvy, true, true);
      else if (kind == NODES) sum += spanEnergy(u, vx, vy, row, bytes, c, bvx, bvy, false, true);
      else if (kind == LINKS) sum += spanEnergy(u, vx, vy, row, bytes, bu, c, c + bytes, true, false);
      else sum += spanEnergy(u, vx, vy, row, bytes, c, c + bytes, c + 2 * bytes, false, false);
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
