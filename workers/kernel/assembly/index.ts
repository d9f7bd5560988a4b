// Owns the time stepping of a run: one pass a row over the memory image described in src/engine/layout.ts.
// Must not know what the numbers mean: polarisation, materials, absorbers and metrics are coefficients.
//
// Order of the float32 operations of a row (the TypeScript twin does the same, bit for bit):
//   u'  = au*u + bu*((vyRight - vy) - (vxAbove - vx))
//   vx' = avx*vx - bvx*(u' - u'Below)
//   vy' = avy*vy + bvy*(u' - u'Left)
import {
  H_BLOCK,
  H_BUFFERS,
  H_CHANNELS,
  H_LINES,
  H_LINE_TABLE,
  H_RECORD,
  H_ROWS,
  H_ROW_TABLE,
  H_STRIDE,
  H_U,
  H_VX,
  H_VY,
  H_WRAP_Y,
  LINE_A,
  LINE_B,
  LINE_BU,
  LINE_BVX,
  LINE_BVY,
  LINE_FED,
  LINE_FEED,
  LINE_LENGTH,
  LINE_LEVEL,
  LINE_MX,
  LINE_MY,
  LINE_U,
  LINE_VX,
  LINE_VY,
  KIND_MASK,
  LINE_WORDS,
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
  SPAN_WORDS,
  SPAN_Y_BU,
  SPAN_Y_BV,
  SPAN_Y_CU,
  SPAN_Y_CV,
  SYNC_ENDED,
  SYNC_FIRST_BLOCK,
  SYNC_GO,
  SYNC_LINES,
  SYNC_PROGRESS,
  SYNC_READY,
  SYNC_STEPS,
  SYNC_STOP,
  TAP_CHANNEL,
  TAP_COLUMN,
  TAP_FIELD,
  TAP_WEIGHT,
  TAP_WORDS,
  WORKED,
  WRAP_A,
  WRAP_B,
  WRAP_FIRST,
  WRAP_LAST,
  WRAP_WORDS,
} from '../../../src/engine/layout';

// @ts-ignore: decorator
@inline function word(at: usize, index: i32): i32 {
  return load<i32>(at + (<usize>index << 2));
}
// @ts-ignore: decorator
@inline function offset(at: usize, index: i32): usize {
  return <usize>load<u32>(at + (<usize>index << 2));
}
// @ts-ignore: decorator
@inline function single(at: usize, index: i32): f32 {
  return load<f32>(at + (<usize>index << 2));
}
// @ts-ignore: decorator
@inline function splat(at: usize, index: i32): v128 {
  return f32x4.splat(load<f32>(at + (<usize>index << 2)));
}

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
  let x = base + offset(span, SPAN_ABSORB_X);
  let psiX = base + offset(span, SPAN_PSI_X);
  let psiY = base + offset(span, SPAN_PSI_Y);
  const ybu = splat(span, SPAN_Y_BU);
  const ycu = splat(span, SPAN_Y_CU);
  const ybv = splat(span, SPAN_Y_BV);
  const ycv = splat(span, SPAN_Y_CV);
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
function workedSpan(span: usize, base: usize, u0: usize, vx0: usize, vy0: usize, row: usize, step: i32, level: i32): void {
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
@inline function passSpan(kind: i32, span: usize, base: usize, u0: usize, vx0: usize, vy0: usize, row: usize): void {
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

// u, vx, vy point at column 0 of the row.
function passRow(program: usize, base: usize, u: usize, vx: usize, vy: usize, row: usize, record: usize, step: i32, level: i32): void {
  let at = program + 4;
  for (let n = load<i32>(program); n > 0; n--) {
    const kind = word(at, SPAN_KIND);
    if (kind & WORKED) workedSpan(at, base, u, vx, vy, row, step, level);
    else passSpan(kind, at, base, u, vx, vy, row);
    at += <usize>SPAN_WORDS << 2;
  }
  const firstColumn = <usize>word(at, WRAP_FIRST) << 2;
  if (firstColumn) {
    const lastColumn = <usize>word(at, WRAP_LAST) << 2;
    const link =
      single(at, WRAP_A) * load<f32>(vy + firstColumn) +
      single(at, WRAP_B) * (load<f32>(u + firstColumn) - load<f32>(u + lastColumn));
    store<f32>(vy + firstColumn, link);
    store<f32>(vy + lastColumn + 4, link);
  }
  at += <usize>WRAP_WORDS << 2;
  const taps = load<i32>(at);
  at += 4;
  for (let k = 0; k < taps; k++) {
    const field = word(at, TAP_FIELD);
    const value = load<f32>((field == 0 ? u : field == 1 ? vx : vy) + (<usize>word(at, TAP_COLUMN) << 2));
    const slot = record + (<usize>word(at, TAP_CHANNEL) << 2);
    store<f32>(slot, load<f32>(slot) + single(at, TAP_WEIGHT) * value);
    at += <usize>TAP_WORDS << 2;
  }
}

// Level `level` + 1 of a line from level `level`.
function stepLine(line: usize, base: usize, step: i32, level: i32): void {
  const length = word(line, LINE_LENGTH);
  const mx = word(line, LINE_MX);
  const my = word(line, LINE_MY);
  const fed = word(line, LINE_FED);
  const next = offset(line, LINE_LEVEL);
  const from = base + next * <usize>level;
  const u = from + offset(line, LINE_U);
  const vx = from + offset(line, LINE_VX);
  const vy = from + offset(line, LINE_VY);
  const u1 = u + next;
  const a = base + offset(line, LINE_A);
  const b = base + offset(line, LINE_B);
  const feed = base + offset(line, LINE_FEED) + (<usize>(step * fed) << 3);
  const bu = load<f64>(line + (<usize>LINE_BU << 2));
  const bvx = load<f64>(line + (<usize>LINE_BVX << 2));
  const bvy = load<f64>(line + (<usize>LINE_BVY << 2));
  for (let r = 0; r < fed; r++) store<f64>(u1 + (<usize>r << 3), load<f64>(feed + (<usize>r << 3)));
  for (let r = fed; r < length - fed; r++) {
    const p = <usize>r << 3;
    const curl =
      load<f64>(vy + (<usize>(r + mx) << 3)) - load<f64>(vy + p) - (load<f64>(vx + (<usize>(r + my) << 3)) - load<f64>(vx + p));
    store<f64>(u1 + p, load<f64>(a + 2 * p) * load<f64>(u + p) + load<f64>(b + 2 * p) * bu * curl);
  }
  for (let r = max(0, my); r < length + min(0, my); r++) {
    const p = <usize>r << 3;
    const h = <usize>(2 * r - my) << 3;
    const rise = load<f64>(u1 + p) - load<f64>(u1 + (<usize>(r - my) << 3));
    store<f64>(vx + next + p, load<f64>(a + h) * load<f64>(vx + p) - load<f64>(b + h) * bvx * rise);
  }
  for (let r = max(0, mx); r < length + min(0, mx); r++) {
    const p = <usize>r << 3;
    const h = <usize>(2 * r - mx) << 3;
    const rise = load<f64>(u1 + p) - load<f64>(u1 + (<usize>(r - mx) << 3));
    store<f64>(vy + next + p, load<f64>(a + h) * load<f64>(vy + p) + load<f64>(b + h) * bvy * rise);
  }
}

/**
 * Steps `first` to `first + block` of a slice, by a front that runs down the rows: step k of a block follows step k - 1 one row
 * behind, while its rows are still in cache (Wonnacott 2000). All that touches a row is done in its pass, so the block's size
 * never changes a bit of the answer. `number` counts blocks since the memory was made. With several threads block n follows
 * block n - 1, which another thread works on, just as closely; only the slice's first block has nothing to wait for.
 */
function passBlock(base: usize, first: i32, block: i32, number: i64, thread: i32, threads: i32): void {
  const row = <usize>word(base, H_STRIDE) << 2;
  const rows = word(base, H_ROWS);
  const u = base + offset(base, H_U);
  const vx = base + offset(base, H_VX);
  const vy = base + offset(base, H_VY);
  const table = base + offset(base, H_ROW_TABLE);
  const channels = <usize>word(base, H_CHANNELS) << 2;
  const wrapY = word(base, H_WRAP_Y);
  const record = base + offset(base, H_RECORD);
  const levels = word(base, H_BLOCK) + 1;
  const buffers = word(base, H_BUFFERS);
  const level = <i32>(number % <i64>buffers) * levels;
  const span = <i64>(rows + 2);
  const mine = <usize>SYNC_PROGRESS + (<usize>thread << 6);
  const before = <usize>SYNC_PROGRESS + (<usize>((thread + threads - 1) % threads) << 6);

  if (threads > 1) waitFor(SYNC_LINES, number);
  stepLines(base, first, block, level);
  if (buffers > 1) {
    carryLines(base, level + block, <i32>((number + 1) % <i64>buffers) * levels);
    if (threads > 1) tell(SYNC_LINES, number + 1);
  }
  for (let front = 1; front < rows + block; front++) {
    // A row reads its neighbour above: the block before must be done with that too.
    if (threads > 1 && first > 0) waitFor(before, (number - 1) * span + <i64>min(front + 1, rows));
    for (let k = max(0, front - rows); k < min(block, front); k++) {
      const j = front - k;
      const at = <usize>j * row;
      // The link below the first row is the one above the last: the ghost row carries it (blocks of one step only).
      if (wrapY && j == rows) memory.copy(u + at, u + row, row);
      const step = first + k;
      passRow(base + offset(table, j), base, u + at, vx + at, vy + at, row, record + <usize>step * channels, step, level + k);
      if (wrapY && j == rows) memory.copy(vx + row, vx + at, row);
    }
    if (threads > 1) tell(mine, number * span + <i64>max(0, front - block + 1));
  }
  if (buffers == 1) carryLines(base, level + block, level);
}

function stepLines(base: usize, first: i32, block: i32, level: i32): void {
  const table = base + offset(base, H_LINE_TABLE);
  for (let n = 0; n < word(base, H_LINES); n++) {
    for (let k = 0; k < block; k++) stepLine(table + <usize>n * (<usize>LINE_WORDS << 2), base, first + k, level + k);
  }
}

// The last level of one block is the first of the next.
function carryLines(base: usize, from: i32, to: i32): void {
  const table = base + offset(base, H_LINE_TABLE);
  for (let n = 0; n < word(base, H_LINES); n++) {
    const line = table + <usize>n * (<usize>LINE_WORDS << 2);
    const bytes = offset(line, LINE_LEVEL);
    const start = base + offset(line, LINE_U);
    memory.copy(start + bytes * <usize>to, start + bytes * <usize>from, bytes);
  }
}

function passBlocks(base: usize, steps: i32, firstBlock: i64, thread: i32, threads: i32): void {
  const most = word(base, H_BLOCK);
  for (let first = 0, n = firstBlock; first < steps; first += most, n++) {
    if (n % <i64>threads == <i64>thread) passBlock(base, first, min(most, steps - first), n, thread, threads);
  }
}

const SPINS = 2000;
const NAP_MILLISECONDS = 0.05;
// Ten seconds or more of waiting for a thread that works on the same slice: it is gone, and the run with it.
const MOST_NAPS = 200_000;
const LONG_MILLISECONDS = 1e9;

// Wait while the int32 at `address` holds `value`, and end such waits: see workers/kernel-imports.mjs.
// @ts-ignore: decorator
@external("env", "nap") declare function nap(address: usize, value: i32, milliseconds: f64): void;
// @ts-ignore: decorator
@external("env", "wake") declare function wake(address: usize): void;

// Waits until the int64 at `address` is at least `value`: spins, then naps, for its writer may have lost its core.
function waitFor(address: usize, value: i64): void {
  if (ASC_FEATURE_THREADS) {
    for (let spins = 0; ; spins++) {
      const seen = atomic.load<i64>(address);
      if (seen >= value) return;
      if (spins > SPINS) nap(address, <i32>seen, NAP_MILLISECONDS);
      if (spins > SPINS + MOST_NAPS) unreachable();
    }
  }
}

function tell(address: usize, value: i64): void {
  if (ASC_FEATURE_THREADS) atomic.store<i64>(address, value);
}

/**
 * Advances the image at `base` by `steps` (at most the slice); clears and fills the record, reads source and feed tables.
 * Helpers that serve the same memory take their share of the blocks.
 */
export function advance(base: usize, steps: i32): void {
  memory.fill(base + offset(base, H_RECORD), 0, (<usize>word(base, H_CHANNELS) << 2) * <usize>steps);
  const firstBlock = load<i64>(SYNC_FIRST_BLOCK);
  if (ASC_FEATURE_THREADS) {
    const threads = min(atomic.load<i32>(SYNC_READY) + 1, word(base, H_BUFFERS) - 1);
    if (threads > 1) {
      store<i32>(SYNC_STEPS, steps);
      atomic.store<i32>(SYNC_ENDED, 0);
      start(threads);
      passBlocks(base, steps, firstBlock, 0, threads);
      for (let spins = 0; ; spins++) {
        const ended = atomic.load<i32>(SYNC_ENDED);
        if (ended == threads - 1) break;
        if (spins > SPINS) nap(SYNC_ENDED, ended, NAP_MILLISECONDS);
        if (spins > SPINS + MOST_NAPS) unreachable();
      }
    } else {
      passBlocks(base, steps, firstBlock, 0, 1);
      // A helper may join at the next slice.
      atomic.store<i64>(SYNC_LINES, firstBlock + blocksOf(base, steps));
    }
  } else {
    passBlocks(base, steps, firstBlock, 0, 1);
  }
  store<i64>(SYNC_FIRST_BLOCK, firstBlock + blocksOf(base, steps));
}

function blocksOf(base: usize, steps: i32): i64 {
  const most = word(base, H_BLOCK);
  return <i64>((steps + most - 1) / most);
}

function start(threads: i32): void {
  if (ASC_FEATURE_THREADS) {
    atomic.store<i32>(SYNC_GO, (((atomic.load<i32>(SYNC_GO) >> 4) + 1) << 4) | threads);
    wake(SYNC_GO);
  }
}

/** Works on slices beside `advance` of another thread until `dismiss`. Needs shared memory. */
export function serve(base: usize): void {
  if (ASC_FEATURE_THREADS) {
    let seen = atomic.load<i32>(SYNC_GO);
    const thread = atomic.add<i32>(SYNC_READY, 1) + 1;
    while (!atomic.load<i32>(SYNC_STOP)) {
      for (let spins = 0; atomic.load<i32>(SYNC_GO) == seen; spins++) {
        if (spins > SPINS) nap(SYNC_GO, seen, LONG_MILLISECONDS);
      }
      seen = atomic.load<i32>(SYNC_GO);
      // Those counted in are waited for, so that the slice's words stand until they have ended.
      if (thread >= (seen & 15)) continue;
      passBlocks(base, load<i32>(SYNC_STEPS), load<i64>(SYNC_FIRST_BLOCK), thread, seen & 15);
      atomic.add<i32>(SYNC_ENDED, 1);
    }
  }
}

/** Sends the helpers home; none may be at work. */
export function dismiss(): void {
  if (ASC_FEATURE_THREADS) {
    atomic.store<i32>(SYNC_STOP, 1);
    start(0);
  }
}

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
