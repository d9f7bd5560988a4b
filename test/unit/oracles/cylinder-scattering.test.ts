// Owns the check of the cylinder series against boundary conditions, conservation laws and published limits.
// Must not know the engine.
import { describe, expect, test } from 'vitest';
import { besselJ } from '../../oracles/bessel.ts';
import { add, magnitude, multiply, phasor, scale, type Complex } from '../../oracles/complex.ts';
import { insertionAround, scatteredField, scatteringCoefficients, type Cylinder } from '../../oracles/cylinder-scattering.ts';

const GLASS = { epsilonRelative: 4, muRelative: 1.3 };
const ANGLES = [0, 0.6, 1.7, Math.PI];

function total(cylinder: Cylinder, k: number, r: number, phi: number): Complex {
  return multiply(phasor(-k * r * Math.cos(phi)), insertionAround(cylinder, k, r, phi));
}

/** sigma / wavelength of the echo in a direction, from the series of the far field: (2/pi) |sum of a_n cos(n phi)|^2. */
function echoWidth(cylinder: Cylinder, k: number, phi: number): number {
  const sum = scatteringCoefficients(cylinder, k).reduce<Complex>(
    (so, a, n) => add(so, scale(a, n === 0 ? 1 : 2 * Math.cos(n * phi))),
    [0, 0],
  );
  return (2 / Math.PI) * magnitude(sum) ** 2;
}

describe('scattering by a circular cylinder', () => {
  test.each(ANGLES)('E along a metal cylinder vanishes on it at %d rad', (phi) => {
    const metal: Cylinder = { axial: 'E', radiusMetres: 1, medium: 'metal' };
    expect(magnitude(total(metal, 3.7, 1, phi))).toBeLessThan(1e-10);
  });

  test.each(ANGLES)('H along a metal cylinder leaves it with zero slope at %d rad', (phi) => {
    const metal: Cylinder = { axial: 'H', radiusMetres: 1, medium: 'metal' };
    const h = 1e-4;
    const [at0, at1, at2] = [0, h, 2 * h].map((d) => total(metal, 3.7, 1 + d, phi));
    // Second-order one-sided difference: error h^2 k^3 / 3, 2e-7 here.
    const slope = add(add(scale(at0 ?? [NaN, 0], -3), scale(at1 ?? [NaN, 0], 4)), scale(at2 ?? [NaN, 0], -1));
    expect(magnitude(slope) / (2 * h)).toBeLessThan(1e-5);
  });

  test.each(['E', 'H'] as const)(
    'a lossless cylinder returns every cylinder wave whole, |1 + 2 a_n| = 1, %s along the axis',
    (axial) => {
      for (const medium of ['metal', GLASS] as const) {
        for (const a of scatteringCoefficients({ axial, radiusMetres: 1, medium }, 2.9)) {
          expect(magnitude(add([1, 0], scale(a, 2)))).toBeCloseTo(1, 12);
        }
      }
    },
  );

  test.each(['E', 'H'] as const)('a cylinder of vacuum scatters nothing, %s along the axis', (axial) => {
    const nothing: Cylinder = { axial, radiusMetres: 1, medium: { epsilonRelative: 1, muRelative: 1 } };
    expect(magnitude(scatteredField(nothing, 5, 1.2, 0.8))).toBeLessThan(1e-12);
  });

  test.each(['E', 'H'] as const)(
    'inside and outside fields meet at the surface of a dielectric cylinder, %s along the axis',
    (axial) => {
      const k = 2.9;
      const glass: Cylinder = { axial, radiusMetres: 1, medium: GLASS };
      // Project the outside field on cos(n phi) and compare value and slope with one standing J_n inside.
      const orders = [0, 1, 2, 3];
      const inside = k * Math.sqrt(GLASS.epsilonRelative * GLASS.muRelative);
      const weight = axial === 'E' ? GLASS.muRelative : GLASS.epsilonRelative;
      const project = (r: number, n: number): Complex => {
        const points = 64;
        let sum: Complex = [0, 0];
        for (let p = 0; p < points; p++) {
          const phi = (2 * Math.PI * p) / points;
          sum = add(sum, scale(total(glass, k, r, phi), Math.cos(n * phi) / points));
        }
        return sum;
      };
      for (const n of orders) {
        const h = 1e-5;
        const value = project(1, n);
        const slope = scale(add(project(1 + h, n), scale(value, -1)), 1 / h);
        const j = besselJ(n, inside)[n] ?? NaN;
        const dj = ((besselJ(n, inside + h)[n] ?? NaN) - (besselJ(n, inside - h)[n] ?? NaN)) / (2 * h);
        const expected = scale(value, (inside * dj) / j / weight);
        // One-sided slope: error h k^2 |value|, 1e-4.
        expect(magnitude(add(slope, scale(expected, -1)))).toBeLessThan(3e-4);
      }
    },
  );

  test('a wire of vanishing radius echoes as the logarithm of its radius (Harrington 5-9, small arguments)', () => {
    const ka = 1e-4;
    const wire: Cylinder = { axial: 'E', radiusMetres: 1, medium: 'metal' };
    // a_0 = -1/(1 - j (2/pi) ln(gamma ka / 2)), gamma = 1.781: Abramowitz & Stegun 9.1.12 and 9.1.13.
    const log = Math.log(0.8905362 * ka);
    const published = 2 / Math.PI / (1 + ((2 / Math.PI) * log) ** 2);
    expect(echoWidth(wire, ka, Math.PI) / published).toBeCloseTo(1, 5);
  });

  test('a thick metal cylinder echoes pi a, the optical value, E along the axis (Balanis 11.5)', () => {
    const ka = 60;
    const thick: Cylinder = { axial: 'E', radiusMetres: 1, medium: 'metal' };
    const sigma = (echoWidth(thick, ka, Math.PI) * 2 * Math.PI) / ka;
    // First correction of the reflected ray is of order 1/(ka)^2 in power; the creeping waves have died.
    expect(sigma / Math.PI).toBeCloseTo(1, 2);
  });

  test.each(['E', 'H'] as const)(
    'what is scattered is taken from the forward wave (optical theorem), %s along the axis',
    (axial) => {
      const a = scatteringCoefficients({ axial, radiusMetres: 1, medium: GLASS }, 2.9);
      const weight = (n: number): number => (n === 0 ? 1 : 2);
      const scattered = a.reduce((sum, value, n) => sum + weight(n) * magnitude(value) ** 2, 0);
      const forward = a.reduce((sum, value, n) => sum - weight(n) * value[0], 0);
      expect(scattered / forward).toBeCloseTo(1, 12);
    },
  );
});
