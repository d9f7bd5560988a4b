// Owns finding the point of a rising axis that lies nearest to a value.
// Must not know plots.

export function nearestIndex(x: readonly number[], value: number): number {
  let low = 0;
  let high = x.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (x[middle]! <= value) low = middle;
    else high = middle;
  }
  return value - (x[low] ?? 0) <= (x[high] ?? 0) - value ? low : high;
}
