// Owns cylinder functions of whole order and real argument, grown by recurrence from a library's orders 0 and 1.
// Must not know what they are used for.
import besselj0 from '@stdlib/math-base-special-besselj0';
import besselj1 from '@stdlib/math-base-special-besselj1';
import bessely0 from '@stdlib/math-base-special-bessely0';
import bessely1 from '@stdlib/math-base-special-bessely1';
import type { Complex } from './complex.ts';

/**
 * J_0(x) to J_orderMax(x), x > 0, to about 1e-13 of the largest of them (relative where x < order).
 * Upward recurrence loses all digits once n > x, so J runs downward from a trial far above both (Miller's algorithm,
 * Abramowitz & Stegun 9.12) and is scaled by the library's J_0 or J_1, whichever is farther from a zero.
 */
export function besselJ(orderMax: number, x: number): Float64Array {
  const start = Math.ceil(Math.max(orderMax, x) + 30 + 3 * Math.cbrt(x) * 4);
  const trial = new Float64Array(start + 2);
  trial[start] = 1e-280;
  for (let n = start; n > 0; n--) {
    const below = ((2 * n) / x) * at(trial, n) - at(trial, n + 1);
    trial[n - 1] = below;
    if (Math.abs(below) > 1e200) for (let m = n - 1; m <= start; m++) trial[m] = at(trial, m) * 1e-250;
  }
  const j0 = besselj0(x);
  const j1 = besselj1(x);
  const factor = Math.abs(j0) > Math.abs(j1) ? j0 / at(trial, 0) : j1 / at(trial, 1);
  return trial.slice(0, orderMax + 1).map((value) => value * factor);
}

/** Y_0(x) to Y_orderMax(x), x > 0. Upward recurrence is stable: Y is the growing solution (Abramowitz & Stegun 9.1.27). */
export function besselY(orderMax: number, x: number): Float64Array {
  const values = new Float64Array(Math.max(2, orderMax + 1));
  values[0] = bessely0(x);
  values[1] = bessely1(x);
  for (let n = 1; n < orderMax; n++) values[n + 1] = ((2 * n) / x) * at(values, n) - at(values, n - 1);
  return values.slice(0, orderMax + 1);
}

/** Derivatives of orders 0 to length-2 from the values of orders 0 to length-1: C_n' = (C_{n-1} - C_{n+1})/2, C_0' = -C_1. */
export function besselDerivatives(values: Float64Array): Float64Array {
  return Float64Array.from({ length: values.length - 1 }, (_, n) =>
    n === 0 ? -at(values, 1) : (at(values, n - 1) - at(values, n + 1)) / 2,
  );
}

/** H_n^(2) = J_n - j Y_n: the outgoing wave where time runs as exp(+jwt). */
export function hankel2(j: Float64Array, y: Float64Array, n: number): Complex {
  return [at(j, n), -at(y, n)];
}

function at(values: Float64Array, n: number): number {
  const value = values[n];
  if (value === undefined) throw new RangeError(`Order ${n} asked of a table of ${values.length} orders.`);
  return value;
}
