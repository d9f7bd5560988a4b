import { expect, test } from 'vitest';
import { RunningDft } from '../../../src/engine/spectrum.ts';

test('the running transform of a Gaussian is the Gaussian of transform tables', () => {
  // exp(-t^2 / 2 s^2) <-> s sqrt(2 pi) exp(-(2 pi f s)^2 / 2), delayed by t0 (any table of Fourier transforms).
  const s = 1e-10;
  const t0 = 1e-9;
  const dt = 1e-11;
  const frequencies = Float64Array.from([0, 1e9, 2.5e9]);
  const dft = new RunningDft(frequencies, dt, [0, 0.5]);
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
