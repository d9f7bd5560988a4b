// Owns the check of the guide and box formulas against published numbers.
// Must not know the engine.
import { describe, expect, test } from 'vitest';
import { C0 } from '../../../src/base/constants.ts';
import { boxResonance, guideAttenuation, guideCutoff } from '../../oracles/rectangular-guide.ts';

describe('guides and boxes of rectangular section', () => {
  test('the 22.86 mm guide opens at 6.557 GHz (IEC 60153-2, R 100; Pozar, appendix I)', () => {
    expect(guideCutoff(22.86e-3, C0) / 1e9).toBeCloseTo(6.557, 3);
  });

  test('far below cutoff a guide takes 27.3 dB off in a length equal to its width (common practice)', () => {
    const width = 5e-3;
    const decibelsPerWidth = 20 * Math.log10(Math.exp(guideAttenuation(width, C0, 1e6) * width));
    expect(decibelsPerWidth).toBeCloseTo(27.3, 1);
  });

  test('there is no decay to state above cutoff', () => {
    expect(() => guideAttenuation(22.86e-3, C0, 7e9)).toThrow(/above cutoff/);
  });

  test('a square box first resonates where its diagonal half-wave fits, at c/(a sqrt 2)', () => {
    expect(boxResonance(0.1, 0.1, 1, 1, C0)).toBeCloseTo(C0 / (0.1 * Math.SQRT2), 0);
  });

  test('a box resonance with one index zero is the cutoff of the guide of that width', () => {
    expect(boxResonance(22.86e-3, 10.16e-3, 1, 0, C0)).toBeCloseTo(guideCutoff(22.86e-3, C0), 3);
  });
});
