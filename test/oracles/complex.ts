// Owns complex arithmetic for the reference formulas: plain immutable pairs, clarity before speed.
// Must not know the engine or any formula that uses it.

export type Complex = readonly [re: number, im: number];

export const ONE: Complex = [1, 0];

export function add(a: Complex, b: Complex): Complex {
  return [a[0] + b[0], a[1] + b[1]];
}

export function subtract(a: Complex, b: Complex): Complex {
  return [a[0] - b[0], a[1] - b[1]];
}

export function multiply(a: Complex, b: Complex): Complex {
  return [a[0] * b[0] - a[1] * b[1], a[0] * b[1] + a[1] * b[0]];
}

export function divide(a: Complex, b: Complex): Complex {
  const size = b[0] * b[0] + b[1] * b[1];
  return [(a[0] * b[0] + a[1] * b[1]) / size, (a[1] * b[0] - a[0] * b[1]) / size];
}

export function scale(a: Complex, factor: number): Complex {
  return [a[0] * factor, a[1] * factor];
}

export function magnitude(a: Complex): number {
  return Math.hypot(a[0], a[1]);
}

/** exp(j phase). */
export function phasor(phaseRadians: number): Complex {
  return [Math.cos(phaseRadians), Math.sin(phaseRadians)];
}

/** Principal root: real part not negative. */
export function squareRoot(a: Complex): Complex {
  const size = magnitude(a);
  const re = Math.sqrt(Math.max(0, (size + a[0]) / 2));
  const im = Math.sqrt(Math.max(0, (size - a[0]) / 2));
  return [re, a[1] < 0 ? -im : im];
}

export function cosine(a: Complex): Complex {
  return [Math.cos(a[0]) * Math.cosh(a[1]), -Math.sin(a[0]) * Math.sinh(a[1])];
}

export function sine(a: Complex): Complex {
  return [Math.sin(a[0]) * Math.cosh(a[1]), Math.cos(a[0]) * Math.sinh(a[1])];
}

export function decibels(amplitude: number): number {
  return 20 * Math.log10(amplitude);
}
