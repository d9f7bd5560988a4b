// Owns the frequency of one steady line in a sampled record.
// Must not know where the record comes from.
// Source: F. J. Harris, "On the use of windows for harmonic analysis with the discrete Fourier transform", Proc. IEEE 66 (1978):
// four-term Blackman-Harris window, side lobes at -92 dB, main lobe 8 bins wide.

const WINDOW = [0.35875, -0.48829, 0.14128, -0.01168] as const;

function windowed(samples: ArrayLike<number>): Float64Array {
  const count = samples.length;
  return Float64Array.from(samples, (value, n) => {
    const phase = (2 * Math.PI * n) / (count - 1);
    return value * WINDOW.reduce((sum, weight, m) => sum + weight * Math.cos(m * phase), 0);
  });
}

/** Magnitude of the transform at a frequency in cycles per sample; the rotation is re-seeded to keep double precision. */
function spectrumAt(samples: Float64Array, cyclesPerSample: number): number {
  const step = 2 * Math.PI * cyclesPerSample;
  const cosStep = Math.cos(step);
  const sinStep = Math.sin(step);
  let re = 0;
  let im = 0;
  let c = 1;
  let s = 0;
  for (let n = 0; n < samples.length; n++) {
    if (n % 512 === 0) {
      c = Math.cos(step * n);
      s = Math.sin(step * n);
    }
    const value = samples[n] ?? 0;
    re += value * c;
    im -= value * s;
    const next = c * cosStep - s * sinStep;
    s = s * cosStep + c * sinStep;
    c = next;
  }
  return Math.hypot(re, im);
}

/**
 * Frequency, Hz, of the strongest line between two frequencies. Neighbouring lines should stand 8 bins (8 / record length)
 * away; the error is then about 1e-4 bin. Throws when the strongest response is at an end of the interval.
 */
export function findLine(samples: ArrayLike<number>, dtSeconds: number, fromHertz: number, toHertz: number): number {
  const data = windowed(samples);
  const from = fromHertz * dtSeconds;
  const to = toHertz * dtSeconds;
  const points = Math.max(8, Math.ceil((to - from) * samples.length) + 1);
  const grid = Array.from({ length: points }, (_, i) => from + ((to - from) * i) / (points - 1));
  const sizes = grid.map((f) => spectrumAt(data, f));
  const best = sizes.indexOf(Math.max(...sizes));
  const low = grid[best - 1];
  const high = grid[best + 1];
  if (low === undefined || high === undefined) throw new RangeError(`No line between ${fromHertz} Hz and ${toHertz} Hz.`);
  return maximise((f) => spectrumAt(data, f), low, high) / dtSeconds;
}

/** Golden section down to 1e-3 of the interval, then a parabola through three points wide enough to stand above rounding. */
function maximise(f: (x: number) => number, from: number, to: number): number {
  const ratio = (Math.sqrt(5) - 1) / 2;
  let low = from;
  let high = to;
  while (high - low > 0.05 * (to - from)) {
    const left = high - ratio * (high - low);
    const right = low + ratio * (high - low);
    if (f(left) > f(right)) high = right;
    else low = left;
  }
  let centre = (low + high) / 2;
  const reach = 0.02 * (to - from);
  for (let turn = 0; turn < 3; turn++) {
    const before = Math.log(f(centre - reach));
    const after = Math.log(f(centre + reach));
    centre += (reach * (before - after)) / (2 * (before - 2 * Math.log(f(centre)) + after));
  }
  return centre;
}
