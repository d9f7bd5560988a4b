// Owns reading the words of a memory image.
// Must not know what they mean.

// @ts-ignore: decorator
@inline export function word(at: usize, index: i32): i32 {
  return load<i32>(at + (<usize>index << 2));
}
// @ts-ignore: decorator
@inline export function offset(at: usize, index: i32): usize {
  return <usize>load<u32>(at + (<usize>index << 2));
}
// @ts-ignore: decorator
@inline export function single(at: usize, index: i32): f32 {
  return load<f32>(at + (<usize>index << 2));
}
// @ts-ignore: decorator
@inline export function splat(at: usize, index: i32): v128 {
  return f32x4.splat(load<f32>(at + (<usize>index << 2)));
}
