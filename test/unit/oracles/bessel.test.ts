// Owns the check of the cylinder functions against published tables and identities.
// Must not know what they are used for.
import { describe, expect, test } from 'vitest';
import { besselDerivatives, besselJ, besselY, hankel2 } from '../../oracles/bessel.ts';

// M. Abramowitz and I. A. Stegun, Handbook of Mathematical Functions, tables 9.1, 9.2 and 9.4 (ten significant figures).
const J_TABLE = [
  { n: 2, x: 1, value: 1.149034849e-1 },
  { n: 3, x: 1, value: 1.956335398e-2 },
  { n: 10, x: 1, value: 2.630615124e-10 },
  { n: 2, x: 10, value: 2.546303137e-1 },
  { n: 10, x: 10, value: 2.074861066e-1 },
  { n: 20, x: 10, value: 1.151336925e-5 },
  { n: 100, x: 100, value: 9.63666733e-2 },
];
const Y_TABLE = [
  { n: 2, x: 1, value: -1.650682607 },
  { n: 10, x: 1, value: -1.216180143e8 },
  { n: 10, x: 10, value: -3.598141522e-1 },
  { n: 100, x: 100, value: -1.669214114e-1 },
];
const ARGUMENTS = [0.05, 0.7, 2.404825557695773, 3.831705970207512, 7.3, 24, 61.5];

describe('cylinder functions', () => {
  test.each(J_TABLE)('J_$n($x) is $value (Abramowitz & Stegun 9.4)', ({ n, x, value }) => {
    expect(Math.abs((besselJ(n, x)[n] ?? NaN) / value - 1)).toBeLessThan(1e-9);
  });

  test.each(Y_TABLE)('Y_$n($x) is $value (Abramowitz & Stegun 9.4)', ({ n, x, value }) => {
    expect(Math.abs((besselY(n, x)[n] ?? NaN) / value - 1)).toBeLessThan(1e-9);
  });

  // 2.404825... and 3.831705... are the first zeros of J_0 and J_1: the normalisation must not divide by them.
  test.each(ARGUMENTS)('J and Y keep their Wronskian 2/(pi x) at x = %d for orders 0 to 40 (A&S 9.1.16)', (x) => {
    const j = besselJ(41, x);
    const y = besselY(41, x);
    for (let n = 0; n <= 40; n++) {
      const wronskian = (j[n + 1] ?? NaN) * (y[n] ?? NaN) - (j[n] ?? NaN) * (y[n + 1] ?? NaN);
      expect(Math.abs((wronskian * Math.PI * x) / 2 - 1)).toBeLessThan(1e-11);
    }
  });

  test.each(ARGUMENTS)('J_0 + 2 (J_2 + J_4 + ...) is 1 at x = %d (A&S 9.1.46)', (x) => {
    const j = besselJ(120, x);
    let sum = j[0] ?? NaN;
    for (let n = 2; n <= 120; n += 2) sum += 2 * (j[n] ?? NaN);
    expect(Math.abs(sum - 1)).toBeLessThan(1e-12);
  });

  test('derivatives agree with a central difference of the functions themselves', () => {
    const x = 5.3;
    const h = 1e-5;
    const derivatives = besselDerivatives(besselJ(7, x));
    for (let n = 0; n <= 6; n++) {
      const difference = ((besselJ(6, x + h)[n] ?? NaN) - (besselJ(6, x - h)[n] ?? NaN)) / (2 * h);
      // Truncation h^2/6 is 2e-11, cancellation 1e-16/h is 1e-11.
      expect(Math.abs((derivatives[n] ?? NaN) - difference)).toBeLessThan(1e-9);
    }
  });

  test('the outgoing wave turns as exp(-jx) far away (A&S 9.2.4)', () => {
    const [first, second] = [500, 501].map((x) => hankel2(besselJ(0, x), besselY(0, x), 0));
    const turn = Math.atan2(second?.[1] ?? NaN, second?.[0] ?? NaN) - Math.atan2(first?.[1] ?? NaN, first?.[0] ?? NaN);
    // The phase of H_0 is x - pi/4 - 1/(8x): the last term moves by 5e-7 between the two.
    expect(1 - Math.cos(turn + 1)).toBeLessThan(1e-12);
  });
});
