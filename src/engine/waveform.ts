// Owns the time course of drives.
// Must not know grids or images.
import { intervalAt } from '../base/interval-at.ts';
import type { ResolvedWaveform } from '../model/job.ts';

/** A waveform ready to be evaluated: cloneable, amplitude 1 at its peak (samples as given). */
export type Waveform =
  | {
      readonly kind: 'band pulse';
      readonly centreHertz: number;
      readonly widthSeconds: number;
      readonly delaySeconds: number;
      readonly scale: number;
    }
  | { readonly kind: 'continuous wave'; readonly frequencyHertz: number; readonly startSeconds: number }
  | { readonly kind: 'damped step'; readonly riseSeconds: number; readonly decaySeconds: number; readonly scale: number }
  | { readonly kind: 'samples'; readonly times: readonly number[]; readonly values: readonly number[] };

/** Spectrum of the band pulse at both ends of the band, relative to the middle. */
const EDGE_LEVEL = 0.25;
/** The pulse starts where its envelope is this small: below single precision. */
const START_LEVEL = 1e-8;

/**
 * Band pulse: a Gaussian times a sine, so that it has no static part, sized so that both ends of the band hold
 * EDGE_LEVEL of the middle. The damped step is the difference of two exponentials.
 */
export function makeWaveform(waveform: ResolvedWaveform, fromHertz: number, toHertz: number): Waveform {
  switch (waveform.kind) {
    case 'band pulse': {
      const centreHertz = (fromHertz + toHertz) / 2;
      // exp(-(2 pi df)^2 w^2 / 2) = EDGE_LEVEL at df = half the band; a narrow band is not made narrower than a quarter
      // of its centre, for a pulse longer than that only costs steps.
      const halfBand = Math.max((toHertz - fromHertz) / 2, centreHertz / 8);
      const widthSeconds = Math.sqrt(-2 * Math.log(EDGE_LEVEL)) / (2 * Math.PI * halfBand);
      const delaySeconds = widthSeconds * Math.sqrt(-2 * Math.log(START_LEVEL));
      const raw = { kind: 'band pulse', centreHertz, widthSeconds, delaySeconds, scale: 1 } as const;
      return { ...raw, scale: 1 / peakOf((t) => Math.abs(waveformAt(raw, t)), delaySeconds, delaySeconds + 0.5 / centreHertz) };
    }
    case 'continuous wave':
      return { kind: 'continuous wave', frequencyHertz: waveform.frequencyHertz, startSeconds: 5 / waveform.frequencyHertz };
    case 'damped step': {
      const { riseSeconds, decaySeconds } = waveform;
      const raw = { kind: 'damped step', riseSeconds, decaySeconds, scale: 1 } as const;
      return { ...raw, scale: 1 / peakOf((t) => waveformAt(raw, t), 0, 20 * Math.max(riseSeconds, decaySeconds)) };
    }
    case 'samples':
      return { kind: 'samples', times: waveform.times, values: waveform.values };
  }
}

function peakOf(f: (t: number) => number, from: number, to: number): number {
  let peak = 0;
  for (let k = 0; k <= 4000; k++) peak = Math.max(peak, f(from + ((to - from) * k) / 4000));
  return peak;
}

/** Value at `t` seconds; 0 before t = 0. */
export function waveformAt(waveform: Waveform, t: number): number {
  if (t <= 0) return waveform.kind === 'samples' && t === 0 && waveform.times[0] === 0 ? (waveform.values[0] ?? 0) : 0;
  switch (waveform.kind) {
    case 'band pulse': {
      const s = t - waveform.delaySeconds;
      const envelope = Math.exp(-(s * s) / (2 * waveform.widthSeconds * waveform.widthSeconds));
      return waveform.scale * envelope * Math.sin(2 * Math.PI * waveform.centreHertz * s);
    }
    case 'continuous wave': {
      const ramp = t >= waveform.startSeconds ? 1 : 0.5 - 0.5 * Math.cos((Math.PI * t) / waveform.startSeconds);
      return ramp * Math.sin(2 * Math.PI * waveform.frequencyHertz * t);
    }
    case 'damped step':
      return waveform.scale * (1 - Math.exp(-t / waveform.riseSeconds)) * Math.exp(-t / waveform.decaySeconds);
    case 'samples':
      return interpolate(waveform.times, waveform.values, t);
  }
}

/** After this it is nothing, or nothing that single precision would show; Infinity when it never is. */
export function waveformSilence(waveform: Waveform): number {
  return waveform.kind === 'band pulse' || waveform.kind === 'samples' ? waveformEnd(waveform) : Infinity;
}

/** When the drive has played out, in seconds: Infinity for a continuous wave. Decay is not judged before. */
export function waveformEnd(waveform: Waveform): number {
  switch (waveform.kind) {
    case 'band pulse':
      return 2 * waveform.delaySeconds;
    case 'continuous wave':
      return Infinity;
    case 'damped step':
      return 5 * waveform.riseSeconds;
    case 'samples':
      return waveform.times[waveform.times.length - 1] ?? 0;
  }
}

function interpolate(times: readonly number[], values: readonly number[], t: number): number {
  const last = times.length - 1;
  if (last < 0 || t < times[0]! || t > times[last]!) return 0;
  const low = intervalAt(times, t);
  const high = Math.min(low + 1, last);
  const span = times[high]! - times[low]!;
  const part = span > 0 ? (t - times[low]!) / span : 0;
  return values[low]! + part * (values[high]! - values[low]!);
}
