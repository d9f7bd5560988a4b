// Owns rows of field samples for pictures, four at a time.
// Must not know what is drawn of them.

// @ts-ignore: decorator
@inline function largestOf(four: v128): f32 {
  return max(
    max(f32x4.extract_lane(four, 0), f32x4.extract_lane(four, 1)),
    max(f32x4.extract_lane(four, 2), f32x4.extract_lane(four, 3)),
  );
}

/**
 * scale * (a[k] + b[k]) into `out` for `count` floats; the addresses are in bytes. Writes up to three floats beyond the last and
 * reads as many. Returns the largest magnitude among what was written.
 */
export function samplePairs(out: usize, a: usize, b: usize, count: i32, scale: f32): f32 {
  const factor = f32x4.splat(scale);
  let most = f32x4.splat(0);
  const end = out + (<usize>count << 2);
  for (; out < end; out += 16, a += 16, b += 16) {
    const value = f32x4.mul(factor, f32x4.add(v128.load(a), v128.load(b)));
    v128.store(out, value);
    most = f32x4.max(most, f32x4.abs(value));
  }
  return largestOf(most);
}

/** sqrt(x^2 + y^2) with x = scaleX * (a[k] + b[k]) and y = scaleY * (c[k] + d[k]); else as `samplePairs`. */
export function sampleMagnitudes(
  out: usize,
  a: usize,
  b: usize,
  c: usize,
  d: usize,
  count: i32,
  scaleX: f32,
  scaleY: f32,
): f32 {
  const toX = f32x4.splat(scaleX);
  const toY = f32x4.splat(scaleY);
  let most = f32x4.splat(0);
  const end = out + (<usize>count << 2);
  for (; out < end; out += 16, a += 16, b += 16, c += 16, d += 16) {
    const x = f32x4.mul(toX, f32x4.add(v128.load(a), v128.load(b)));
    const y = f32x4.mul(toY, f32x4.add(v128.load(c), v128.load(d)));
    const value = f32x4.sqrt(f32x4.add(f32x4.mul(x, x), f32x4.mul(y, y)));
    v128.store(out, value);
    most = f32x4.max(most, value);
  }
  return largestOf(most);
}
