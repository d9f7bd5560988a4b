// Owns the plain TypeScript twin of the kernel: the same image, the same order of float32 operations, equal bits.
// Must not know workers. It is the reference of the parity tests and the baseline of the bench, never used for runs.
import * as L from './layout.ts';

interface Views {
  readonly i32: Int32Array;
  readonly f32: Float32Array;
  readonly f64: Float64Array;
}

const f = Math.fround;

/** Advances an image (offset 0 of `bytes`) by `steps`, at most its slice. */
export function advanceImage(bytes: ArrayBuffer, steps: number): void {
  const views: Views = { i32: new Int32Array(bytes), f32: new Float32Array(bytes), f64: new Float64Array(bytes) };
  const { i32, f32 } = views;
  const header = (word: number): number => i32[word]!;
  const stride = header(L.H_STRIDE);
  const rows = header(L.H_ROWS);
  const u = header(L.H_U) >> 2;
  const vx = header(L.H_VX) >> 2;
  const vy = header(L.H_VY) >> 2;
  const table = header(L.H_ROW_TABLE) >> 2;
  const channels = header(L.H_CHANNELS);
  const lines = header(L.H_LINES);
  const lineTable = header(L.H_LINE_TABLE) >> 2;
  for (let step = 0; step < steps; step++) {
    const record = (header(L.H_RECORD) >> 2) + step * channels;
    f32.fill(0, record, record + channels);
    for (let k = 0; k < lines; k++) stepLine(views, lineTable + k * L.LINE_WORDS, step);
    for (let j = 1; j <= rows; j++) {
      const at = j * stride;
      const wraps = header(L.H_WRAP_Y) === 1 && j === rows;
      if (wraps) f32.copyWithin(u + at, u + stride, u + 2 * stride);
      passRow(views, i32[table + j]! >> 2, u + at, vx + at, vy + at, stride, record, step);
      if (wraps) f32.copyWithin(vx + stride, vx + at, vx + at + stride);
    }
    for (let k = 0; k < lines; k++) {
      const line = lineTable + k * L.LINE_WORDS;
      const from = i32[line + L.LINE_U]! >> 3;
      const level = i32[line + L.LINE_LEVEL]! >> 3;
      views.f64.copyWithin(from, from + level, from + 2 * level);
    }
  }
}

function passRow(
  views: Views,
  program: number,
  u: number,
  vx: number,
  vy: number,
  stride: number,
  record: number,
  step: number,
): void {
  const { i32, f32 } = views;
  let at = program + 1;
  for (let n = i32[program]!; n > 0; n--) {
    passSpan(views, at, u, vx, vy, stride, step);
    at += L.SPAN_WORDS;
  }
  const first = i32[at + L.WRAP_FIRST]!;
  if (first !== 0) {
    const last = i32[at + L.WRAP_LAST]!;
    const rise = f(f32[u + first]! - f32[u + last]!);
    const link = f(f(f32[at + L.WRAP_A]! * f32[vy + first]!) + f(f32[at + L.WRAP_B]! * rise));
    f32[vy + first] = link;
    f32[vy + last + 1] = link;
  }
  at += L.WRAP_WORDS;
  for (let k = i32[at++]!; k > 0; k--) {
    const field = i32[at + L.TAP_FIELD]!;
    const value = f32[(field === 0 ? u : field === 1 ? vx : vy) + i32[at + L.TAP_COLUMN]!]!;
    const slot = record + i32[at + L.TAP_CHANNEL]!;
    f32[slot] = f(f32[slot]! + f(f32[at + L.TAP_WEIGHT]! * value));
    at += L.TAP_WORDS;
  }
}

function passSpan(views: Views, span: number, u0: number, vx0: number, vy0: number, stride: number, step: number): void {
  const { i32, f32 } = views;
  const kind = i32[span + L.SPAN_KIND]!;
  const first = i32[span + L.SPAN_COLUMN]!;
  const count = i32[span + L.SPAN_COUNT]!;
  const c = i32[span + L.SPAN_COEFFICIENTS]! >> 2;
  const lossy = (kind & L.KIND_MASK) === L.LOSSY;
  const evenU = kind === L.PLAIN || kind === L.LINKS;
  const evenV = kind === L.PLAIN || kind === L.NODES;
  const links = kind === L.LINKS ? c : c + count;
  const u = u0 + first;
  const vx = vx0 + first;
  const vy = vy0 + first;
  for (let k = 0; k < count; k++) {
    const b = evenU ? f32[span + L.SPAN_BU]! : f32[c + k]!;
    const a = lossy ? f32[c + 3 * count + k]! : 1;
    const curl = f(f(f32[vy + k + 1]! - f32[vy + k]!) - f(f32[vx + k + stride]! - f32[vx + k]!));
    f32[u + k] = f(f(a * f32[u + k]!) + f(b * curl));
  }
  if ((kind & L.WORKED) !== 0) uTerms(views, span, u0, vx0, vy0, stride, step);
  for (let k = 0; k < count; k++) {
    const bx = evenV ? f32[span + L.SPAN_BVX]! : f32[links + k]!;
    const by = evenV ? f32[span + L.SPAN_BVY]! : f32[links + count + k]!;
    const ax = lossy ? f32[c + 4 * count + k]! : 1;
    const ay = lossy ? f32[c + 5 * count + k]! : 1;
    f32[vx + k] = f(f(ax * f32[vx + k]!) - f(bx * f(f32[u + k]! - f32[u + k - stride]!)));
    f32[vy + k] = f(f(ay * f32[vy + k]!) + f(by * f(f32[u + k]! - f32[u + k - 1]!)));
  }
  if ((kind & L.WORKED) !== 0) vTerms(views, span, u0, vx0, vy0, stride, step);
}

function uTerms(views: Views, span: number, u0: number, vx0: number, vy0: number, stride: number, step: number): void {
  const { i32, f32 } = views;
  const first = i32[span + L.SPAN_COLUMN]!;
  const count = i32[span + L.SPAN_COUNT]!;
  const bu = i32[span + L.SPAN_COEFFICIENTS]! >> 2;
  const u = u0 + first;
  const vx = vx0 + first;
  const vy = vy0 + first;
  const absorb = i32[span + L.SPAN_ABSORB_X]! >> 2;
  if (absorb !== 0) {
    const psi = i32[span + L.SPAN_PSI_X]! >> 2;
    for (let k = 0; k < count; k++) {
      const next = f(f(f32[absorb + k]! * f32[psi + k]!) + f(f32[absorb + count + k]! * f(f32[vy + k + 1]! - f32[vy + k]!)));
      f32[psi + k] = next;
      f32[u + k] = f(f32[u + k]! + f(f32[bu + k]! * next));
    }
  }
  const psi = i32[span + L.SPAN_PSI_Y]! >> 2;
  if (psi !== 0) {
    for (let k = 0; k < count; k++) {
      const next = f(
        f(f32[span + L.SPAN_Y_BU]! * f32[psi + k]!) + f(f32[span + L.SPAN_Y_CU]! * f(f32[vx + k + stride]! - f32[vx + k]!)),
      );
      f32[psi + k] = next;
      f32[u + k] = f(f32[u + k]! - f(f32[bu + k]! * next));
    }
  }
  points(views, i32[span + L.SPAN_POINTS]! >> 2, i32[span + L.SPAN_U_POINTS]!, u0, vx0, vy0, step);
}

function vTerms(views: Views, span: number, u0: number, vx0: number, vy0: number, stride: number, step: number): void {
  const { i32, f32 } = views;
  const first = i32[span + L.SPAN_COLUMN]!;
  const count = i32[span + L.SPAN_COUNT]!;
  const bvx = (i32[span + L.SPAN_COEFFICIENTS]! >> 2) + count;
  const bvy = bvx + count;
  const u = u0 + first;
  const vx = vx0 + first;
  const vy = vy0 + first;
  const absorb = i32[span + L.SPAN_ABSORB_X]! >> 2;
  if (absorb !== 0) {
    const b = absorb + 2 * count;
    const psi = (i32[span + L.SPAN_PSI_X]! >> 2) + count;
    for (let k = 0; k < count; k++) {
      const next = f(f(f32[b + k]! * f32[psi + k]!) + f(f32[b + count + k]! * f(f32[u + k]! - f32[u + k - 1]!)));
      f32[psi + k] = next;
      f32[vy + k] = f(f32[vy + k]! + f(f32[bvy + k]! * next));
    }
  }
  if (i32[span + L.SPAN_PSI_Y] !== 0) {
    const psi = (i32[span + L.SPAN_PSI_Y]! >> 2) + count;
    for (let k = 0; k < count; k++) {
      const next = f(
        f(f32[span + L.SPAN_Y_BV]! * f32[psi + k]!) + f(f32[span + L.SPAN_Y_CV]! * f(f32[u + k]! - f32[u + k - stride]!)),
      );
      f32[psi + k] = next;
      f32[vx + k] = f(f32[vx + k]! - f(f32[bvx + k]! * next));
    }
  }
  const uPoints = i32[span + L.SPAN_U_POINTS]!;
  const at = (i32[span + L.SPAN_POINTS]! >> 2) + uPoints * L.POINT_WORDS;
  points(views, at, i32[span + L.SPAN_V_POINTS]!, u0, vx0, vy0, step);
}

function points(views: Views, at: number, count: number, u: number, vx: number, vy: number, step: number): void {
  const { i32, f32, f64 } = views;
  const weight = new Float64Array(1);
  const words = new Int32Array(weight.buffer);
  for (let k = 0; k < count; k++, at += L.POINT_WORDS) {
    const field = i32[at + L.POINT_FIELD]!;
    const target = (field === 0 ? u : field === 1 ? vx : vy) + i32[at + L.POINT_COLUMN]!;
    // Steps are blocks of one here, so an incident line is always at its level 0.
    const ahead = i32[at + L.POINT_FROM_TABLE] === 1 ? step : 0;
    const value = f64[(i32[at + L.POINT_SOURCE]! + i32[at + L.POINT_STEP]! * ahead) >> 3]!;
    words[0] = i32[at + L.POINT_WEIGHT]!;
    words[1] = i32[at + L.POINT_WEIGHT + 1]!;
    f32[target] = f(f32[target]! + f(weight[0]! * value));
  }
}

function stepLine({ i32, f64 }: Views, line: number, step: number): void {
  const at = (word: number): number => i32[line + word]! >> 3;
  const length = i32[line + L.LINE_LENGTH]!;
  const mx = i32[line + L.LINE_MX]!;
  const my = i32[line + L.LINE_MY]!;
  const fed = i32[line + L.LINE_FED]!;
  const [u, vx, vy, a, b] = [at(L.LINE_U), at(L.LINE_VX), at(L.LINE_VY), at(L.LINE_A), at(L.LINE_B)];
  const next = at(L.LINE_LEVEL);
  const u1 = u + next;
  const feed = at(L.LINE_FEED) + step * fed;
  const double = (word: number): number => f64[(line + word) >> 1]!;
  const [bu, bvx, bvy] = [double(L.LINE_BU), double(L.LINE_BVX), double(L.LINE_BVY)];
  for (let r = 0; r < fed; r++) f64[u1 + r] = f64[feed + r]!;
  for (let r = fed; r < length - fed; r++) {
    const curl = f64[vy + r + mx]! - f64[vy + r]! - (f64[vx + r + my]! - f64[vx + r]!);
    f64[u1 + r] = f64[a + 2 * r]! * f64[u + r]! + f64[b + 2 * r]! * bu * curl;
  }
  for (let r = Math.max(0, my); r < length + Math.min(0, my); r++) {
    const h = 2 * r - my;
    f64[vx + next + r] = f64[a + h]! * f64[vx + r]! - f64[b + h]! * bvx * (f64[u1 + r]! - f64[u1 + r - my]!);
  }
  for (let r = Math.max(0, mx); r < length + Math.min(0, mx); r++) {
    const h = 2 * r - mx;
    f64[vy + next + r] = f64[a + h]! * f64[vy + r]! + f64[b + h]! * bvy * (f64[u1 + r]! - f64[u1 + r - mx]!);
  }
}
