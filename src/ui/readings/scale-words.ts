// Owns the numbers on axes: SI prefixes common to a whole axis.
// Must not know plots.

const PREFIXES = [
  [1e12, 'T'],
  [1e9, 'G'],
  [1e6, 'M'],
  [1e3, 'k'],
  [1, ''],
  [1e-3, 'm'],
  [1e-6, 'µ'],
  [1e-9, 'n'],
  [1e-12, 'p'],
  [1e-15, 'f'],
] as const;

/** Factor and unit with prefix in which `largest` has one to three digits before the point: 6e9 Hz -> 1e9, "GHz". */
export function axisUnit(largest: number, unit: string): { readonly factor: number; readonly unit: string } {
  const found = PREFIXES.find(([factor]) => Math.abs(largest) >= factor * 0.9999) ?? PREFIXES[PREFIXES.length - 1]!;
  return largest === 0 ? { factor: 1, unit } : { factor: found[0], unit: `${found[1]}${unit}` };
}

/** As few digits as tell neighbouring ticks apart; a true minus sign. */
export function tickWords(values: readonly number[], factor: number): string[] {
  const step = values.length > 1 ? Math.abs(values[1]! - values[0]!) / factor : 1;
  const digits = Math.max(0, Math.min(6, -Math.floor(Math.log10(step) + 1e-9)));
  return values.map((value) => (value / factor).toFixed(digits).replace('-', '−'));
}

/** Ticks of a logarithmic axis stand at uneven steps: each takes the digits it needs. */
export function unevenTickWords(values: readonly number[], factor: number): string[] {
  return values.map((value) => String(Number((value / factor).toPrecision(3))));
}

export function numberWords(value: number, digits: number): string {
  return value.toFixed(digits).replace('-', '−');
}
