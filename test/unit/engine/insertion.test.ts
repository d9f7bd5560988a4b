import { describe, expect, test } from 'vitest';
import { CAUSES, insertionCurve, levelCurve, makeInsertion, type SpectrumRun } from '../../../src/engine/insertion.ts';

const dtSeconds = 1e-11;
const frequenciesHertz = Float64Array.from([1e9, 2e9, 3e9]);

/** A run whose record is a decaying pulse of the given size and whose spectra are given. */
function run(
  scale: number,
  spectra: readonly (readonly [re: number, im: number])[],
  ringing: (n: number) => number = () => 0,
): SpectrumRun {
  const samples = Float32Array.from({ length: 2000 }, (_, n) => scale * Math.exp(-(((n - 200) / 40) ** 2)) + ringing(n));
  const spectrum = { re: spectra.map(([re]) => re), im: spectra.map(([, im]) => im) };
  return {
    components: ['Hz', 'Ex', 'Ey'],
    dtSeconds,
    frequenciesHertz,
    traces: [{ probeId: 'p', samples: [samples, samples, samples] }],
    spectra: [{ probeId: 'p', components: [spectrum, spectrum, spectrum] }],
    driveSpectrum: { re: [1e-10, 1e-10, 1e-13], im: [0, 0, 0] },
  };
}

describe('the insertion ratio', () => {
  const reference = run(1, [
    [4e-10, 0],
    [0, 2e-10],
    [1e-10, 0],
  ]);
  const main = run(0.1, [
    [0, 4e-11],
    [2e-12, 0],
    [1e-11, 0],
  ]);

  test('is the field with the parts over the field without them, complex and in dB', () => {
    const [probe] = makeInsertion(main, reference);
    expect(probe!.components[1]!.re[0]).toBeCloseTo(0, 12);
    expect(probe!.components[1]!.im[0]).toBeCloseTo(0.1, 12);
    expect(probe!.components[1]!.re[1]).toBeCloseTo(0, 12);
    expect(probe!.components[1]!.im[1]).toBeCloseTo(-0.01, 12);
    const curve = insertionCurve(main, reference, 'p', 'Ey')!;
    expect([...curve.db.subarray(0, 2)].map((value) => Math.round(value * 1e6) / 1e6)).toEqual([-20, -40]);
  });

  test('of |E| takes both in-plane components, of |H| the one out of the plane', () => {
    const across = insertionCurve(main, reference, 'p', '|E|')!;
    expect(across.db[0]).toBeCloseTo(-20, 9);
    expect(insertionCurve(main, reference, 'p', '|H|')!.db[1]).toBeCloseTo(-40, 9);
    expect(insertionCurve(main, reference, 'p', 'Ez')).toBeNull();
  });

  test('is unknown where the drive holds less than a hundredth of its most', () => {
    const curve = insertionCurve(main, reference, 'p', 'Ex')!;
    expect([...curve.cause].map((cause) => CAUSES[cause])).toEqual(['known', 'known', 'the drive holds too little there']);
  });

  test('is unknown where what the end of the record cuts off hides it', () => {
    // A ringing of 1e-3 V/m at 2 GHz that does not decay: a period of the lowest frequency, 1 ns, adds 1e-3 x 1 ns / 2 at
    // 2 GHz and may do so for each of the 20 such periods of the record: at least 1e-11 V/m/Hz.
    const cut = run(
      0.1,
      [
        [0, 4e-11],
        [2e-12, 0],
        [1e-11, 0],
      ],
      (n) => (n > 1000 ? 1e-3 * Math.sin(2 * Math.PI * 2e9 * n * dtSeconds) : 0),
    );
    const curve = insertionCurve(cut, reference, 'p', 'Ey')!;
    expect(CAUSES[curve.cause[1]!]).toMatch(/end of the record/);
    expect(curve.floorDb[1]).toBeGreaterThan(20 * Math.log10(1e-11 / 2e-10));
    expect(curve.floorDb[1]).toBeLessThan(20 * Math.log10(5e-11 / 2e-10));
    // Away from the ringing much less is cut off.
    expect(curve.floorDb[0]! + 20 * Math.log10(4e-10)).toBeLessThan(curve.floorDb[1]! + 20 * Math.log10(2e-10) - 10);
  });

  test('is unknown where single precision hides it', () => {
    // Rounding: 2^-24 dt sqrt(sum x^2) with x = exp(-((n - 200) / 40)^2), so sum x^2 = 40 sqrt(pi / 2).
    const noise = 2 ** -24 * dtSeconds * Math.sqrt(40 * Math.sqrt(Math.PI / 2));
    const faint = run(1, [
      [0.9 * noise, 0],
      [1.1 * noise, 0],
      [1, 0],
    ]);
    const curve = insertionCurve(faint, reference, 'p', 'Ey')!;
    expect([...curve.cause.subarray(0, 2)]).toEqual([1, 0]);
  });

  test('is unknown where the reference field itself is hidden', () => {
    const dark = run(1, [
      [0, 0],
      [2e-10, 0],
      [1e-10, 0],
    ]);
    expect(CAUSES[insertionCurve(main, dark, 'p', 'Ey')!.cause[0]!]).toMatch(/reference/);
  });
});

test('the level is the field over the spectrum of the unit drive, 3.01 dB less in RMS', () => {
  const main = run(0.1, [
    [0, 4e-11],
    [2e-12, 0],
    [1e-11, 0],
  ]);
  // 4e-11 / 1e-10 = 0.4 V/m peak = 112.04 dBuV/m; RMS is the peak over sqrt 2 (common practice).
  expect(levelCurve(main, 'p', 'Ey', false)!.db[0]).toBeCloseTo(112.0412, 3);
  expect(levelCurve(main, 'p', 'Ey', true)!.db[0]).toBeCloseTo(112.0412 - 3.0103, 3);
});

describe('a drive that goes on for the whole record', () => {
  // Unit amplitude at 2 GHz for 20 ns: its spectrum there is half the record, 1e-8 / Hz (Fourier transform of a sine burst).
  const driven = (scale: number, envelope: (n: number) => number): SpectrumRun => {
    const flat: [number, number] = [0, 0];
    const steady = run(
      0,
      [flat, [0, scale * 1e-8], flat],
      (n) => scale * envelope(n) * Math.sin(2 * Math.PI * 2e9 * n * dtSeconds),
    );
    return { ...steady, driveSpectrum: { re: [0, 0, 0], im: [0, 1e-8, 0] } };
  };
  const settled = (n: number): number => 1 - Math.exp(-n / 50);

  test('is read at its frequency once the field has settled', () => {
    const curve = insertionCurve(driven(0.1, settled), driven(1, settled), 'p', 'Ey')!;
    expect(curve.db[1]).toBeCloseTo(-20, 9);
    expect([...curve.cause].map((cause) => CAUSES[cause])).toEqual([CAUSES[3], 'known', CAUSES[3]]);
  });

  test('is unknown while the field still builds up', () => {
    const building = (n: number): number => n / 2000;
    expect(insertionCurve(driven(0.1, building), driven(1, settled), 'p', 'Ey')!.cause[1]).toBe(1);
    expect(insertionCurve(driven(0.1, settled), driven(1, building), 'p', 'Ey')!.cause[1]).toBe(2);
  });

  test('does not lend its trust to a field that rings on after a pulse', () => {
    const ringing = { ...driven(0.1, settled), driveSpectrum: { re: [0, 0, 0], im: [0, 1e-10, 0] } };
    expect(insertionCurve(ringing, driven(1, settled), 'p', 'Ey')!.cause[1]).toBe(1);
  });
});
