// Owns the field round a circular cylinder in a plane wave, by the series of cylinder waves (the two-dimensional Mie series).
// Must not know the engine.
// Source: R. F. Harrington, Time-Harmonic Electromagnetic Fields, sections 5-9 and 5-10; C. A. Balanis, Advanced Engineering
// Electromagnetics, 2nd ed., section 11.5 (both exp(+jwt), incident exp(-jkx), outgoing Hankel functions of the second kind).
import { besselDerivatives, besselJ, besselY, hankel2 } from './bessel.ts';
import { add, divide, multiply, ONE, scale, type Complex } from './complex.ts';

/** The component along the axis: Ez where E is out of the plane, Hz where H is. */
export type AxialField = 'E' | 'H';

/** A lossless cylinder: perfect metal, or a medium with these constants. */
export type CylinderMedium = 'metal' | { readonly epsilonRelative: number; readonly muRelative: number };

export interface Cylinder {
  readonly axial: AxialField;
  readonly radiusMetres: number;
  readonly medium: CylinderMedium;
}

/** Wiscombe's rule for the number of terms (Applied Optics 19, 1980), with a margin that leaves 1e-12. */
function orderFor(x: number): number {
  return Math.ceil(x + 4.05 * Math.cbrt(x) + 10);
}

/** Coefficients a_0..a_N of the outgoing waves in vacuum with wavenumber k, rad/m; a_-n = a_n. */
export function scatteringCoefficients(cylinder: Cylinder, k: number): readonly Complex[] {
  const x = k * cylinder.radiusMetres;
  const orderMax = orderFor(x);
  const j = besselJ(orderMax + 1, x);
  const y = besselY(orderMax + 1, x);
  const dj = besselDerivatives(j);
  const dy = besselDerivatives(y);
  const medium = cylinder.medium;
  const orders = Array.from({ length: orderMax + 1 }, (_, n) => n);
  if (medium === 'metal') {
    const [regular, second] = cylinder.axial === 'E' ? [j, y] : [dj, dy];
    return orders.map((n) => divide([-(regular[n] ?? 0), 0], hankel2(regular, second, n)));
  }
  const index = Math.sqrt(medium.epsilonRelative * medium.muRelative);
  const inside = besselJ(orderMax + 1, index * x);
  const dInside = besselDerivatives(inside);
  // The tangential partner field is (1/mu) dE/dr for E along the axis, (1/eps) dH/dr for H.
  const slope = index / (cylinder.axial === 'E' ? medium.muRelative : medium.epsilonRelative);
  return orders.map((n) => {
    const value = inside[n] ?? 0;
    const derivative = slope * (dInside[n] ?? 0);
    const numerator: Complex = [-(derivative * (j[n] ?? 0) - value * (dj[n] ?? 0)), 0];
    const h = scale(hankel2(j, y, n), derivative);
    const dh = scale(hankel2(dj, dy, n), -value);
    return divide(numerator, add(h, dh));
  });
}

/**
 * Scattered axial field at (r, phi) from the centre, phi counted from the direction the incident wave travels to,
 * over the incident field at the centre. r >= radius.
 */
export function scatteredField(cylinder: Cylinder, k: number, rMetres: number, phiRadians: number): Complex {
  const a = scatteringCoefficients(cylinder, k);
  const j = besselJ(a.length, k * rMetres);
  const y = besselY(a.length, k * rMetres);
  let sum: Complex = [0, 0];
  let turn: Complex = ONE;
  for (let n = 0; n < a.length; n++) {
    const weight = n === 0 ? 1 : 2 * Math.cos(n * phiRadians);
    const wave = multiply(multiply(turn, a[n] ?? [0, 0]), hankel2(j, y, n));
    sum = add(sum, scale(wave, weight));
    turn = multiply(turn, [0, -1]);
  }
  return sum;
}

/** Total over incident field at a point: what an insertion ratio with the cylinder left out of the reference must be. */
export function insertionAround(cylinder: Cylinder, k: number, rMetres: number, phiRadians: number): Complex {
  const phase = k * rMetres * Math.cos(phiRadians);
  const incident: Complex = [Math.cos(phase), -Math.sin(phase)];
  return add(ONE, divide(scatteredField(cylinder, k, rMetres, phiRadians), incident));
}
