import { expect, test } from 'vitest';
import { PhasorTable, RunningDft } from '../../../src/engine/spectrum.ts';

test('the running transform of a Gaussian is the Gaussian of transform tables', () => {
  // exp(-t^2 / 2 s^2) <-> s sqrt(2 pi) exp(-(2 pi f s)^2 / 2), delayed by t0 (any table of Fourier transforms).
  const s = 1e-10;
  const t0 = 1e-9;
  const dt = 1e-11;
  const frequencies = Float64Array.from([0, 1e9, 2.5e9]);
  const dft = new RunningDft(new PhasorTable(frequencies, dt), [0, 0.5]);
  const steps = 200;
  const gaussian = (t: number): number => Math.exp(-((t - t0) ** 2) / (2 * s * s));
  for (let first = 0; first < steps; first += 50) {
    const block = Float32Array.from({ length: 100 }, (_, k) => gaussian((first + (k >> 1) + (k & 1) / 2) * dt));
    dft.add(block, first, 50);
  }
  for (const channel of [0, 1]) {
    const { re, im } = dft.channel(channel);
    frequencies.forEach((f, k) => {
      const size = s * Math.sqrt(2 * Math.PI) * Math.exp(-((2 * Math.PI * f * s) ** 2) / 2);
      expect(re[k]! / size).toBeCloseTo(Math.cos(2 * Math.PI * f * t0), 5);
      expect(im[k]! / size).toBeCloseTo(-Math.sin(2 * Math.PI * f * t0), 5);
    });
  }
});

test('the same samples give the same bits however they are cut, in threes and alone', () => {
  const phasors = new PhasorTable(
    Float64Array.from({ length: 7 }, (_, k) => (k + 1) * 1e9),
    3e-12,
  );
  for (const channels of [1, 3, 6]) {
    const offsets = Array.from({ length: channels }, (_, c) => (c % 3 === 0 ? 0 : 0.5));
    const samples = Float32Array.from({ length: 500 * channels }, (_, k) => Math.sin(k * 0.37) * Math.exp(-k / 900));
    const spectrumOf = (cuts: readonly number[]): number[] => {
      const dft = new RunningDft(phasors, offsets);
      cuts.reduce((from, count) => {
        dft.add(samples.subarray(from * channels, (from + count) * channels), from + 1, count);
        return from + count;
      }, 0);
      return offsets.flatMap((_, c) => [...dft.channel(c).re, ...dft.channel(c).im]);
    };
    const whole = spectrumOf([500]);
    expect(spectrumOf([1, 62, 1, 1, 255, 100, 80])).toEqual(whole);
    const direct = phasors.turns.reduce((worst, turn, k) => {
      const sum = samples.reduce((re, x, at) => (at % channels === 0 ? re + x * Math.cos(turn * (at / channels + 1)) : re), 0);
      return Math.max(worst, Math.abs(sum * 3e-12 - whole[k]!) / 3e-12);
    }, 0);
    expect(direct).toBeLessThan(1e-11);
  }
});
