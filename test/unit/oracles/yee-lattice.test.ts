// Owns the check of the lattice formulas against published values and their limits.
// Must not know the engine.
import { describe, expect, test } from 'vitest';
import { yeeAttenuation, yeeFrequency, yeeWavenumber, type YeeLattice } from '../../oracles/yee-lattice.ts';

// Unit cells and unit speed: dt is then the Courant number.
const HALF: YeeLattice = { dxMetres: 1, dyMetres: 1, dtSeconds: 0.5, speed: 1 };
const DEGREE = Math.PI / 180;

describe('waves on the Yee lattice', () => {
  // Taflove & Hagness, 3rd ed., section 4.4, two dimensions, S = 0.5, 20 cells per wavelength (from memory).
  test.each([
    { angle: 0, published: 0.996892 },
    { angle: 45, published: 0.998968 },
  ])('the phase velocity at $angle degrees is $published of the free one', ({ angle, published }) => {
    const omega = (2 * Math.PI) / 20;
    expect(omega / yeeWavenumber(HALF, omega, angle * DEGREE)).toBeCloseTo(published, 6);
  });

  test('along the diagonal at the Courant limit every wave runs at the free speed (Taflove & Hagness, the magic step)', () => {
    const magic: YeeLattice = { ...HALF, dtSeconds: Math.SQRT1_2 };
    for (const cells of [3, 7, 20]) {
      const omega = (2 * Math.PI) / cells;
      expect(yeeWavenumber(magic, omega, 45 * DEGREE)).toBeCloseTo(omega, 12);
    }
  });

  test('frequency and wavenumber undo each other on oblong cells', () => {
    const oblong: YeeLattice = { dxMetres: 1e-3, dyMetres: 0.7e-3, dtSeconds: 1.7e-12, speed: 299792458 };
    const omega = 2 * Math.PI * 23e9;
    const angle = 31 * DEGREE;
    const k = yeeWavenumber(oblong, omega, angle);
    expect(yeeFrequency(oblong, k * Math.cos(angle), k * Math.sin(angle)) / omega).toBeCloseTo(1, 13);
  });

  test('the error of the wavenumber falls with the square of the cell', () => {
    const excess = (cells: number): number => {
      const omega = (2 * Math.PI) / cells;
      return yeeWavenumber(HALF, omega, 0.3) / omega - 1;
    };
    expect(excess(40) / excess(80)).toBeCloseTo(4, 1);
  });

  test('decay below cutoff tends to sqrt(kc^2 - k^2) and is zero where the guide opens', () => {
    const width = 400;
    const kc = Math.PI / width;
    const omega = 0.6 * kc;
    expect(yeeAttenuation(HALF, omega, kc) / (0.8 * kc)).toBeCloseTo(1, 4);
    expect(yeeAttenuation(HALF, yeeFrequency(HALF, 0, kc) * (1 - 1e-15), kc)).toBeLessThan(1e-6 * kc);
    expect(() => yeeAttenuation(HALF, 1.1 * kc, kc)).toThrow(/runs freely/);
  });
});
