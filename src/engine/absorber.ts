// Owns the convolutional PML profiles of one axis.
// Must not know rows, images or media other than the index of refraction at the edge.
// Source: J. A. Roden and S. D. Gedney, Microw. Opt. Technol. Lett. 27 (2000) 334, equations 10 to 17.
import { C0, EPS0, ETA0 } from '../base/constants.ts';
import type { Axis } from './grid.ts';

/** Per unknown (or link) of an axis: metric stretch kappa, and b, c of psi' = b psi + c difference, c with kappa in it. */
export interface AbsorberProfile {
  readonly kappa: Float64Array;
  readonly b: Float64Array;
  readonly c: Float64Array;
}

/** Order of the polynomial grading of sigma and kappa. */
const ORDER = 3;
const LEAST_KAPPA = 5;
/**
 * Where the grid is finer than the wave needs, a few cells are a small part of a wave, and an evanescent field comes back
 * from the end of the strip with its phase turned by sigma, which can feed energy to a resonance that stands close by. So
 * kappa stretches the strip to as much as this many radians a cell at the top of the band (README.md, equation 9).
 */
const MOST_RADIANS = 2;
/** Gain of the strip at f = 0, 1 + c / (1 - b), kept clear of single-precision rounding: it must not be negative. */
const LEAST_STATIC_GAIN = 1e-5;

/** Profiles for u positions and for link positions. `index` is sqrt(eps mu) of the background. */
export function makeAbsorber(
  axis: Axis,
  dtSeconds: number,
  index: number,
  band: { readonly fromHertz: number; readonly toHertz: number },
): { readonly u: AbsorberProfile; readonly link: AbsorberProfile } {
  // alpha sits below the band so that waves in the band are absorbed and what lies below it decays.
  const mostAlpha = 2 * Math.PI * EPS0 * band.fromHertz * 0.5;
  const first = axis.lines[axis.before]!;
  const last = axis.lines[axis.before + axis.cells]!;
  const outerLow = axis.lines[0]!;
  const outerHigh = axis.lines[axis.lines.length - 1]!;
  const profile = (positions: Float64Array): AbsorberProfile => {
    const n = positions.length;
    const kappa = new Float64Array(n).fill(1);
    const b = new Float64Array(n);
    const c = new Float64Array(n);
    for (let k = 0; k < n; k++) {
      const at = positions[k]!;
      const inLow = axis.before > 0 && at < first;
      const inHigh = axis.after > 0 && at > last;
      if (!inLow && !inHigh) continue;
      const thickness = inLow ? first - outerLow : outerHigh - last;
      const spacing = thickness / (inLow ? axis.before : axis.after);
      const depth = Math.min(1, (inLow ? first - at : at - last) / thickness);
      const grading = depth ** ORDER;
      const sigma = (0.8 * (ORDER + 1) * grading) / (ETA0 * spacing * index);
      const mostKappa = Math.max(LEAST_KAPPA, (MOST_RADIANS * C0) / (2 * Math.PI * band.toHertz * index * spacing));
      const stretch = 1 + (mostKappa - 1) * grading;
      const alpha = mostAlpha * (1 - depth);
      kappa[k] = stretch;
      // The kernel works with the rounded b, so c is made from it.
      b[k] = Math.fround(Math.exp(-((sigma / stretch + alpha) * dtSeconds) / EPS0));
      const share = Math.min(sigma / (sigma + stretch * alpha), 1 - LEAST_STATIC_GAIN);
      c[k] = -share * (1 - b[k]!);
    }
    return { kappa, b, c };
  };
  return { u: profile(axis.position), link: profile(axis.linkPosition) };
}
