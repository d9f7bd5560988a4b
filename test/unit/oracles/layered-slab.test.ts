// Owns the check of the transfer matrix against closed formulas of the books and against conservation laws.
// Must not know the engine.
import { describe, expect, test } from 'vitest';
import { C0, ETA0 } from '../../../src/base/constants.ts';
import { magnitude } from '../../oracles/complex.ts';
import { insertionBehind, makeSlabResponse, type Layer } from '../../oracles/layered-slab.ts';

const F = 10e9;
const WAVELENGTH = C0 / F;

function dielectric(epsilonRelative: number, thicknessMetres: number): Layer {
  return { epsilonRelative, muRelative: 1, sigma: 0, sigmaMagnetic: 0, thicknessMetres };
}

const STACK = [
  dielectric(2.2, 3.1e-3),
  { epsilonRelative: 4, muRelative: 1.5, sigma: 0.3, sigmaMagnetic: 500, thicknessMetres: 2.4e-3 },
  dielectric(9, 1.7e-3),
];

describe('layers at normal incidence', () => {
  test.each([2, 4, 9])('a quarter-wave plate of permittivity %d reflects ((1-n^2)/(1+n^2))^2 (Born & Wolf 1.6)', (epsilon) => {
    const response = makeSlabResponse([dielectric(epsilon, WAVELENGTH / Math.sqrt(epsilon) / 4)], F);
    expect(magnitude(response.reflection) ** 2).toBeCloseTo(((1 - epsilon) / (1 + epsilon)) ** 2, 12);
  });

  test('a half-wave plate reflects nothing and turns the phase by 180 degrees', () => {
    const response = makeSlabResponse([dielectric(4, WAVELENGTH / 4)], F);
    expect(magnitude(response.reflection)).toBeLessThan(1e-12);
    expect(response.transmission[0]).toBeCloseTo(-1, 12);
  });

  test('a plate follows the Airy formula 1/T = 1 + [(n - 1/n)/2 sin(kd)]^2', () => {
    const [n, d] = [2.3, 4.7e-3];
    const sine = Math.sin((2 * Math.PI * n * d) / WAVELENGTH);
    const power = magnitude(makeSlabResponse([dielectric(n * n, d)], F).transmission) ** 2;
    expect(1 / power).toBeCloseTo(1 + (((n - 1 / n) / 2) * sine) ** 2, 12);
  });

  test('a resistive film of the impedance of space passes 2/3 and reflects -1/3 of the field', () => {
    const thicknessMetres = 1e-9;
    const film = { ...dielectric(1, thicknessMetres), sigma: 1 / (ETA0 * thicknessMetres) };
    const response = makeSlabResponse([film], F);
    expect(response.transmission[0]).toBeCloseTo(2 / 3, 5);
    expect(response.reflection[0]).toBeCloseTo(-1 / 3, 5);
  });

  test('a lossy plate with equal electric and magnetic loss tangents reflects nothing', () => {
    const matched = { epsilonRelative: 3, muRelative: 3, sigma: 0.2, sigmaMagnetic: 0.2 * ETA0 ** 2, thicknessMetres: 5e-3 };
    const response = makeSlabResponse([matched], F);
    expect(magnitude(response.reflection)).toBeLessThan(1e-12);
    // Np: sigma*eta0*d.
    expect(magnitude(response.transmission)).toBeCloseTo(Math.exp(-0.2 * ETA0 * 5e-3), 12);
  });

  test('a thick good conductor swallows a neper every skin depth, 1/sqrt(pi f mu0 sigma)', () => {
    const sigma = 1e4;
    const skin = 1 / Math.sqrt(Math.PI * F * 4e-7 * Math.PI * sigma);
    const [thin, thick] = [5, 6].map((depths) => makeSlabResponse([{ ...dielectric(1, depths * skin), sigma }], F));
    const ratio = magnitude(thin?.transmission ?? [NaN, 0]) / magnitude(thick?.transmission ?? [NaN, 0]);
    // Displacement current changes the exponent by w eps0/(2 sigma) = 3e-5; the back-and-forth wave by exp(-10).
    expect(ratio).toBeCloseTo(Math.E, 3);
  });

  test('reflected and transmitted power add to one without loss, and to less with it', () => {
    const powers = (layers: readonly Layer[]): number => {
      const response = makeSlabResponse(layers, F);
      return magnitude(response.reflection) ** 2 + magnitude(response.transmission) ** 2;
    };
    expect(powers(STACK.map((layer) => ({ ...layer, sigma: 0, sigmaMagnetic: 0 })))).toBeCloseTo(1, 12);
    expect(powers(STACK)).toBeLessThan(0.95);
  });

  test('a stack passes the same wave from either side', () => {
    const forward = makeSlabResponse(STACK, F).transmission;
    const backward = makeSlabResponse([...STACK].reverse(), F).transmission;
    expect(forward[0]).toBeCloseTo(backward[0], 12);
    expect(forward[1]).toBeCloseTo(backward[1], 12);
  });

  test('layers of vacuum leave the insertion ratio at one', () => {
    const ratio = insertionBehind([dielectric(1, 3e-3), dielectric(1, 8e-3)], F);
    expect(ratio[0]).toBeCloseTo(1, 12);
    expect(ratio[1]).toBeCloseTo(0, 12);
  });
});
