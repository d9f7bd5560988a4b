// Owns what a waveform becomes when a person chooses another kind: parameters that fit the band.
// Must not know fields on the screen.
import { formatQuantity } from '../../base/quantity.ts';
import type { ResolvedJob, Waveform } from '../../model/job.ts';

export const WAVEFORM_WORDS: readonly (readonly [Waveform['kind'], string])[] = [
  ['band pulse', 'band pulse'],
  ['continuous wave', 'continuous wave'],
  ['damped step', 'damped step'],
  ['samples', 'waveform of samples'],
];

/** Rise time of a step that holds energy up to `hertz`: 0.35 over the bandwidth (common practice). */
const RISE_TIMES_BANDWIDTH = 0.35;

/** Samples have to be loaded and are not made up here. */
export function makeWaveform(
  kind: Exclude<Waveform['kind'], 'samples'>,
  band: Pick<ResolvedJob['band'], 'fromHertz' | 'toHertz'>,
): Waveform {
  switch (kind) {
    case 'band pulse':
      return { kind };
    case 'continuous wave':
      return { kind, frequency: formatQuantity((band.fromHertz + band.toHertz) / 2, 'frequency', 4) };
    case 'damped step':
      return {
        kind,
        rise: formatQuantity(RISE_TIMES_BANDWIDTH / band.toHertz, 'time', 2),
        decay: formatQuantity(2 / band.fromHertz, 'time', 2),
      };
  }
}

/** "from the left", for waves along an axis; the angle says it all otherwise. */
export function describeTravel(angleRadians: number): string {
  const quarter = (angleRadians * 2) / Math.PI;
  const whole = Math.round(quarter);
  if (Math.abs(quarter - whole) > 1e-6) return '';
  return ['from the left', 'from below', 'from the right', 'from above'][((whole % 4) + 4) % 4] ?? '';
}
