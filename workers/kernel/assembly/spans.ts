// Owns the spans of a row: the update of u, vx and vy over a run of columns, with the terms of absorbers and drives.
// Must not know what the numbers mean: polarisation, materials, absorbers and metrics are coefficients.
//
// Order of the float32 operations (the TypeScript twin does the same, bit for bit):
//   u'  = au*u + bu*((vyRight - vy) - (vxAbove - vx))
//   vx' = avx*vx - bvx*(u' - u'Below)
//   vy' = avy*vy + bvy*(u' - u'Left)
import {
  KIND_MASK,
  LINKS,
  LOSSLESS,
  LOSSY,
  NODES,
  PLAIN,
  POINT_COLUMN,
  POINT_FIELD,
  POINT_FROM_TABLE,
  POINT_SOURCE,
  POINT_STEP,
  POINT_WEIGHT,
  POINT_WORDS,
  SPAN_ABSORB_X,
  SPAN_BU,
  SPAN_BVX,
  SPAN_BVY,
  SPAN_COEFFICIENTS,
  SPAN_COLUMN,
  SPAN_COUNT,
  SPAN_KIND,
  SPAN_POINTS,
  SPAN_PSI_X,
  SPAN_PSI_Y,
  SPAN_U_POINTS,
  SPAN_V_POINTS,
  SPAN_Y_BU,
  SPAN_Y_BV,
  SPAN_Y_CU,
  SPAN_Y_CV,
} from '../../../src/engine/layout';
import { word, offset, single, splat } from './words';

// Four cells without loss; returns the new u so that the next four find their left neighbour in a register. `unit` is for
// links with b = 1 (empty square cells): times 1 is exact, so leaving it out changes no bit. Flags like this one are known at
// compile time, so each use becomes a loop of its own.
// @ts-ignore: decorator
@inline function four(u: usize, vx: usize, vy: usize, row: usize, bu: v128, bvx: v128, bvy: v128, left: v128, unit: bool): v128 {
  const oldVx = v128.load(vx);
  const oldVy = v128.load(vy);
  const next = f32x4.add(
    v128.load(u),
    f32x4.mul(bu, f32x4.sub(f32x4.sub(v128.load(vy, 4), oldVy), f32x4.sub(v128.load(vx + row), oldVx))),
  );
  v128.store(u, next);
  const riseY = f32x4.sub(next, v128.load(u - row));
  const riseX = f32x4.sub(next, v128.shuffle<f32>(left, next, 3, 4, 5, 6));
  v128.store(vx, f32x4.sub(oldVx, unit ? riseY : f32x4.mul(bvx, riseY)));
  v128.store(vy, f32x4.add(oldVy, unit ? riseX : f32x4.mul(bvy, riseX)));
  return next;
}

// @ts-ignore: decorator
@inline function scalarLoop(u: usize, vx: usize, vy: usize, row: usize, bytes: usize, bu: v128, bvx: v128, bvy: v128, unit: bool): void {
  let left = v128.load(u - 16);
  let end = u + (bytes & ~63);
  while (u < end) {
    left = four(u, vx, vy, row, bu, bvx, bvy, left, unit);
    left = four(u + 16, vx + 16, vy + 16, row, bu, bvx, bvy, left, unit);
    left = four(u + 32, vx + 32, vy + 32, row, bu, bvx, bvy, left, unit);
    left = four(u + 48, vx + 48, vy + 48, row, bu, bvx, bvy, left, unit);
    u += 64;
    vx += 64;
    vy += 64;
  }
  end = u + (bytes & 63);
  while (u < end) {
    left = four(u, vx, vy, row, bu, bvx, bvy, left, unit);
    u += 16;
    vx += 16;
    vy += 16;
  }
}

// Arrays begin at c: bu where `nodes`, then bvx and bvy where `links`.
// @ts-ignore: decorator
@inline function arrayLoop(
  u: usize,
  vx: usize,
  vy: usize,
  row: usize,
  bytes: usize,
  c: usize,
  bu: v128,
  bvx: v128,
  bvy: v128,
  nodes: bool,
  links: bool,
  unit: bool,
): void {
  let left = v128.load(u - 16);
  const end = u + bytes;
  const cx: usize = nodes ? bytes : 0;
  const cy = cx + bytes;
  while (u < end) {
    left = four(
      u,
      vx,
      vy,
      row,
      nodes ? v128.load(c) : bu,
      links ? v128.load(c + cx) : bvx,
      links ? v128.load(c + cy) : bvy,
      left,
      unit,
    );
    u += 16;
    vx += 16;
    vy += 16;
    c += 16;
  }
}

function plainSpan(u: usize, vx: usize, vy: usize, row: usize, bytes: usize, bu: v128, bvx: v128, bvy: v128): void {
  scalarLoop(u, vx, vy, row, bytes, bu, bvx, bvy, false);
}

function unitPlainSpan(u: usize, vx: usize, vy: usize, row: usize, bytes: usize, bu: v128): void {
  scalarLoop(u, vx, vy, row, bytes, bu, bu, bu, true);
}

function nodesSpan(u: usize, vx: usize, vy: usize, row: usize, bytes: usize, c: usize, bvx: v128, bvy: v128): void {
  arrayLoop(u, vx, vy, row, bytes, c, bvx, bvx, bvy, true, false, false);
}

function unitNodesSpan(u: usize, vx: usize, vy: usize, row: usize, bytes: usize, c: usize, bu: v128): void {
  arrayLoop(u, vx, vy, row, bytes, c, bu, bu, bu, true, false, true);
}

function linksSpan(u: usize, vx: usize, vy: usize, row: usize, bytes: usize, c: usize, bu: v128): void {
  arrayLoop(u, vx, vy, row, bytes, c, bu, bu, bu, false, true, false);
}

function losslessSpan(u: usize, vx: usize, vy: usize, row: usize, bytes: usize, c: usize, bu: v128): void {
  arrayLoop(u, vx, vy, row, bytes, c, bu, bu, bu, true, true, false);
}

function lossySpan(u: usize, vx: usize, vy: usize, row: usize, bytes: usize, c: usize): void {
  let left = v128.load(u - 16);
  const end = u + bytes;
  const n = bytes;
  while (u < end) {
    const oldVx = v128.load(vx);
    const oldVy = v128.load(vy);
    const next = f32x4.add(
      f32x4.mul(v128.load(c + 3 * n), v128.load(u)),
      f32x4.mul(v128.load(c), f32x4.sub(f32x4.sub(v128.load(vy, 4), oldVy), f32x4.sub(v128.load(vx + row), oldVx))),
    );
    v128.store(u, next);
    v128.store(
      vx,
      f32x4.sub(f32x4.mul(v128.load(c + 4 * n), oldVx), f32x4.mul(v128.load(c + n), f32x4.sub(next, v128.load(u - row)))),
    );
    v128.store(
      vy,
      f32x4.add(
        f32x4.mul(v128.load(c + 5 * n), oldVy),
        f32x4.mul(v128.load(c + 2 * n), f32x4.sub(next, v128.shuffle<f32>(left, next, 3, 4, 5, 6))),
      ),
    );
    left = next;
    u += 16;
    vx += 16;
    vy += 16;
    c += 16;
  }
}

// A span in an absorber without drive terms, in one pass: the same operations a cell as the pass by pass below.
// @ts-ignore: decorator
@inline function absorbingSpan(span: usize, base: usize, u: usize, vx: usize, vy: usize, row: usize, inX: bool, inY: bool, lossy: bool): void {
  const n = <usize>word(span, SPAN_COUNT) << 2;
  const end = u + n;
  let c = base + offset(span, SPAN_COEFFICIENTS);
  let x = inX ? base + offset(span, SPAN_ABSORB_X) : 0;
  let psiX = inX ? base + offset(span, SPAN_PSI_X) : 0;
  let psiY = inY ? base + offset(span, SPAN_PSI_Y) : 0;
  // The compiler keeps loads that nothing reads, so those of an axis that is not absorbed are left out by hand.
  const ybu = inY ? splat(span, SPAN_Y_BU) : f32x4.splat(0);
  const ycu = inY ? splat(span, SPAN_Y_CU) : f32x4.splat(0);
  const ybv = inY ? splat(span, SPAN_Y_BV) : f32x4.splat(0);
  const ycv = inY ? splat(span, SPAN_Y_CV) : f32x4.splat(0);
  let left = v128.load(u - 16);
  while (u < end) {
    const oldVx = v128.load(vx);
    const oldVy = v128.load(vy);
    const dx = f32x4.sub(v128.load(vy, 4), oldVy);
    const dy = f32x4.sub(v128.load(vx + row), oldVx);
    const bu = v128.load(c);
    let next = v128.load(u);
    if (lossy) next = f32x4.mul(v128.load(c + 3 * n), next);
    next = f32x4.add(next, f32x4.mul(bu, f32x4.sub(dx, dy)));
    if (inX) {
      const psi = f32x4.add(f32x4.mul(v128.load(x), v128.load(psiX)), f32x4.mul(v128.load(x + n), dx));
      v128.store(psiX, psi);
      next = f32x4.add(next, f32x4.mul(bu, psi));
    }
    if (inY) {
      const psi = f32x4.add(f32x4.mul(ybu, v128.load(psiY)), f32x4.mul(ycu, dy));
      v128.store(psiY, psi);
      next = f32x4.sub(next, f32x4.mul(bu, psi));
    }
    v128.store(u, next);
    const bvx = v128.load(c + n);
    const bvy = v128.load(c + 2 * n);
    const riseY = f32x4.sub(next, v128.load(u - row));
    const riseX = f32x4.sub(next, v128.shuffle<f32>(left, next, 3, 4, 5, 6));
    let nextVx = f32x4.sub(lossy ? f32x4.mul(v128.load(c + 4 * n), oldVx) : oldVx, f32x4.mul(bvx, riseY));
    let nextVy = f32x4.add(lossy ? f32x4.mul(v128.load(c + 5 * n), oldVy) : oldVy, f32x4.mul(bvy, riseX));
    if (inX) {
      const psi = f32x4.add(f32x4.mul(v128.load(x + 2 * n), v128.load(psiX + n)), f32x4.mul(v128.load(x + 3 * n), riseX));
      v128.store(psiX + n, psi);
      nextVy = f32x4.add(nextVy, f32x4.mul(bvy, psi));
    }
    if (inY) {
      const psi = f32x4.add(f32x4.mul(ybv, v128.load(psiY + n)), f32x4.mul(ycv, riseY));
      v128.store(psiY + n, psi);
      nextVx = f32x4.sub(nextVx, f32x4.mul(bvx, psi));
    }
    v128.store(vx, nextVx);
    v128.store(vy, nextVy);
    left = next;
    u += 16;
    vx += 16;
    vy += 16;
    c += 16;
    x += 16;
    psiX += 16;
    psiY += 16;
  }
}

// `step` counts in the slice (source table), `level` over the buffers of the incident lines.
function points(at: usize, count: i32, base: usize, u: usize, vx: usize, vy: usize, step: i32, level: i32): void {
  for (let k = 0; k < count; k++) {
    const field = word(at, POINT_FIELD);
    const target = (field == 0 ? u : field == 1 ? vx : vy) + (<usize>word(at, POINT_COLUMN) << 2);
    const ahead = word(at, POINT_FROM_TABLE) ? step : level;
    const value = load<f64>(base + offset(at, POINT_SOURCE) + offset(at, POINT_STEP) * <usize>ahead);
    store<f32>(target, load<f32>(target) + <f32>(load<f64>(at + (<usize>POINT_WEIGHT << 2)) * value));
    at += <usize>POINT_WORDS << 2;
  }
}

// A span with absorber or drive terms: u, its terms, v, its terms. u, vx, vy point at the span's first column.
export function workedSpan(span: usize, base: usize, u0: usize, vx0: usize, vy0: usize, row: usize, step: i32, level: i32): void {
  const first = <usize>word(span, SPAN_COLUMN) << 2;
  const bytes = <usize>word(span, SPAN_COUNT) << 2;
  const c = base + offset(span, SPAN_COEFFICIENTS);
  const lossy = (word(span, SPAN_KIND) & KIND_MASK) == LOSSY;
  const u = u0 + first;
  const vx = vx0 + first;
  const vy = vy0 + first;
  const absorbX = offset(span, SPAN_ABSORB_X);
  const psiY = offset(span, SPAN_PSI_Y);
  const uPoints = word(span, SPAN_U_POINTS);
  const vPoints = word(span, SPAN_V_POINTS);
  const pointsAt = base + offset(span, SPAN_POINTS);
  if (uPoints + vPoints == 0) {
    if (lossy) absorbingSpan(span, base, u, vx, vy, row, absorbX != 0, psiY != 0, true);
    else if (!psiY) absorbingSpan(span, base, u, vx, vy, row, true, false, false);
    else if (!absorbX) absorbingSpan(span, base, u, vx, vy, row, false, true, false);
    else absorbingSpan(span, base, u, vx, vy, row, true, true, false);
    return;
  }

  for (let k: usize = 0; k < bytes; k += 16) {
    const curl = f32x4.sub(
      f32x4.sub(v128.load(vy + k, 4), v128.load(vy + k)),
      f32x4.sub(v128.load(vx + k + row), v128.load(vx + k)),
    );
    const old = v128.load(u + k);
    const kept = lossy ? f32x4.mul(v128.load(c + 3 * bytes + k), old) : old;
    v128.store(u + k, f32x4.add(kept, f32x4.mul(v128.load(c + k), curl)));
  }
  if (absorbX) {
    const b = base + absorbX;
    const psi = base + offset(span, SPAN_PSI_X);
    for (let k: usize = 0; k < bytes; k += 16) {
      const next = f32x4.add(
        f32x4.mul(v128.load(b + k), v128.load(psi + k)),
        f32x4.mul(v128.load(b + bytes + k), f32x4.sub(v128.load(vy + k, 4), v128.load(vy + k))),
      );
      v128.store(psi + k, next);
      v128.store(u + k, f32x4.add(v128.load(u + k), f32x4.mul(v128.load(c + k), next)));
    }
  }
  if (psiY) {
    const psi = base + psiY;
    const b = splat(span, SPAN_Y_BU);
    const cc = splat(span, SPAN_Y_CU);
    for (let k: usize = 0; k < bytes; k += 16) {
      const next = f32x4.add(
        f32x4.mul(b, v128.load(psi + k)),
        f32x4.mul(cc, f32x4.sub(v128.load(vx + k + row), v128.load(vx + k))),
      );
      v128.store(psi + k, next);
      v128.store(u + k, f32x4.sub(v128.load(u + k), f32x4.mul(v128.load(c + k), next)));
    }
  }
  points(pointsAt, uPoints, base, u0, vx0, vy0, step, level);

  for (let k: usize = 0; k < bytes; k += 16) {
    const now = v128.load(u + k);
    const oldVx = v128.load(vx + k);
    const oldVy = v128.load(vy + k);
    const keptX = lossy ? f32x4.mul(v128.load(c + 4 * bytes + k), oldVx) : oldVx;
    const keptY = lossy ? f32x4.mul(v128.load(c + 5 * bytes + k), oldVy) : oldVy;
    v128.store(vx + k, f32x4.sub(keptX, f32x4.mul(v128.load(c + bytes + k), f32x4.sub(now, v128.load(u + k - row)))));
    v128.store(vy + k, f32x4.add(keptY, f32x4.mul(v128.load(c + 2 * bytes + k), f32x4.sub(now, v128.load(u + k - 4)))));
  }
  if (absorbX) {
    const b = base + absorbX + 2 * bytes;
    const psi = base + offset(span, SPAN_PSI_X) + bytes;
    for (let k: usize = 0; k < bytes; k += 16) {
      const next = f32x4.add(
        f32x4.mul(v128.load(b + k), v128.load(psi + k)),
        f32x4.mul(v128.load(b + bytes + k), f32x4.sub(v128.load(u + k), v128.load(u + k - 4))),
      );
      v128.store(psi + k, next);
      v128.store(vy + k, f32x4.add(v128.load(vy + k), f32x4.mul(v128.load(c + 2 * bytes + k), next)));
    }
  }
  if (psiY) {
    const psi = base + psiY + bytes;
    const b = splat(span, SPAN_Y_BV);
    const cc = splat(span, SPAN_Y_CV);
    for (let k: usize = 0; k < bytes; k += 16) {
      const next = f32x4.add(
        f32x4.mul(b, v128.load(psi + k)),
        f32x4.mul(cc, f32x4.sub(v128.load(u + k), v128.load(u + k - row))),
      );
      v128.store(psi + k, next);
      v128.store(vx + k, f32x4.sub(v128.load(vx + k), f32x4.mul(v128.load(c + bytes + k), next)));
    }
  }
  points(pointsAt + <usize>uPoints * (<usize>POINT_WORDS << 2), vPoints, base, u0, vx0, vy0, step, level);
}

// A span without absorber or drive. u, vx, vy point at column 0 of the row.
// @ts-ignore: decorator
@inline export function passSpan(kind: i32, span: usize, base: usize, u0: usize, vx0: usize, vy0: usize, row: usize): void {
  const first = <usize>word(span, SPAN_COLUMN) << 2;
  const bytes = <usize>word(span, SPAN_COUNT) << 2;
  const c = base + offset(span, SPAN_COEFFICIENTS);
  const u = u0 + first;
  const vx = vx0 + first;
  const vy = vy0 + first;
  const bu = splat(span, SPAN_BU);
  const bvx = splat(span, SPAN_BVX);
  const bvy = splat(span, SPAN_BVY);
  const unit = single(span, SPAN_BVX) == 1 && single(span, SPAN_BVY) == 1;
  if (kind == PLAIN) {
    if (unit) unitPlainSpan(u, vx, vy, row, bytes, bu);
    else plainSpan(u, vx, vy, row, bytes, bu, bvx, bvy);
  } else if (kind == NODES) {
    if (unit) unitNodesSpan(u, vx, vy, row, bytes, c, bu);
    else nodesSpan(u, vx, vy, row, bytes, c, bvx, bvy);
  } else if (kind == LINKS) linksSpan(u, vx, vy, row, bytes, c, bu);
  else if (kind == LOSSLESS) losslessSpan(u, vx, vy, row, bytes, c, bu);
  else lossySpan(u, vx, vy, row, bytes, c);
}
