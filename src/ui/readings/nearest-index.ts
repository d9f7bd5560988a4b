// Owns finding the point of a rising axis that lies nearest to a value.
// Must not know plots.
import { intervalAt } from '../../base/interval-at.ts';

export function nearestIndex(x: readonly number[], value: number): number {
  const low = intervalAt(x, value);
  const high = Math.min(low + 1, x.length - 1);
  return value - (x[low] ?? 0) <= (x[high] ?? 0) - value ? low : Math.max(0, high);
}
