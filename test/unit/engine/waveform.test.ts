import { describe, expect, test } from 'vitest';
import { makeWaveform, waveformAt, waveformEnd, type Waveform } from '../../../src/engine/waveform.ts';

function spectrum(waveform: Waveform, hertz: number, dt: number, until: number): number {
  let re = 0;
  let im = 0;
  for (let t = 0; t < until; t += dt) {
    re += waveformAt(waveform, t) * Math.cos(2 * Math.PI * hertz * t) * dt;
    im += waveformAt(waveform, t) * Math.sin(2 * Math.PI * hertz * t) * dt;
  }
  return Math.hypot(re, im);
}

describe('the band pulse', () => {
  const pulse = makeWaveform({ kind: 'band pulse' }, 1e9, 6e9);

  test('holds at least a fifth of the middle at both ends of the band and nothing static', () => {
    const end = waveformEnd(pulse);
    const middle = spectrum(pulse, 3.5e9, 2e-12, end);
    expect(spectrum(pulse, 1e9, 2e-12, end) / middle).toBeGreaterThan(0.2);
    expect(spectrum(pulse, 6e9, 2e-12, end) / middle).toBeGreaterThan(0.2);
    expect(spectrum(pulse, 0, 2e-12, end) / middle).toBeLessThan(1e-6);
  });

  test('has a peak of 1 and starts and ends below single precision', () => {
    let peak = 0;
    for (let t = 0; t < waveformEnd(pulse); t += 1e-13) peak = Math.max(peak, Math.abs(waveformAt(pulse, t)));
    expect(peak).toBeCloseTo(1, 4);
    expect(Math.abs(waveformAt(pulse, 1e-13))).toBeLessThan(6e-8);
    expect(Math.abs(waveformAt(pulse, waveformEnd(pulse)))).toBeLessThan(6e-8);
  });
});

test('a continuous wave starts smoothly and reaches its amplitude', () => {
  const wave = makeWaveform({ kind: 'continuous wave', frequencyHertz: 2e9 }, 1e9, 3e9);
  expect(Math.abs(waveformAt(wave, 0.125e-9))).toBeLessThan(0.02);
  expect(waveformAt(wave, 10.125e-9)).toBeCloseTo(1, 9);
  expect(waveformEnd(wave)).toBe(Infinity);
});

test('a damped step rises within its rise time, peaks at 1 and decays', () => {
  const step = makeWaveform({ kind: 'damped step', riseSeconds: 1e-10, decaySeconds: 5e-9 }, 1e8, 1e9);
  let peak = 0;
  for (let t = 0; t < 3e-8; t += 1e-12) peak = Math.max(peak, waveformAt(step, t));
  expect(peak).toBeCloseTo(1, 3);
  expect(waveformAt(step, 3e-8)).toBeLessThan(0.01);
});

test('samples are joined by straight lines and end at zero', () => {
  const samples = makeWaveform({ kind: 'samples', times: [0, 1e-9, 2e-9], values: [0, 2, 1] }, 1e8, 1e9);
  expect(waveformAt(samples, 0.5e-9)).toBeCloseTo(1, 12);
  expect(waveformAt(samples, 1.5e-9)).toBeCloseTo(1.5, 12);
  expect(waveformAt(samples, 2.1e-9)).toBe(0);
});
