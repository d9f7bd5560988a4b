// Owns finding the interval of a rising row of numbers that holds a value.
// Must not know what the numbers are.

/** Index k with `borders[k] <= at < borders[k + 1]`, by bisection; clamped to 0 and the last interval. */
export function intervalAt(borders: ArrayLike<number>, at: number): number {
  let low = 0;
  let high = borders.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (borders[middle]! <= at) low = middle;
    else high = middle;
  }
  return low;
}
