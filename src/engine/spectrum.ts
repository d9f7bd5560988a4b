// Owns the running discrete Fourier transform of recorded channels, in double precision.
// Must not know what the channels mean beyond their time offset.

/** Samples between exact phasors. */
const EXACT_EVERY = 256;

/**
 * Accumulates X(f) = dt sum x[n] exp(-j 2 pi f (n + offset) dt) over blocks of samples as they come, exp(+jwt) convention.
 * `offsets` gives each channel's time offset in steps (0 for u, 1/2 for in-plane fields).
 */
export class RunningDft {
  private readonly frequencies: Float64Array;
  private readonly dtSeconds: number;
  private readonly offsets: readonly number[];
  /** [frequency][channel], real and imaginary. */
  private readonly re: Float64Array;
  private readonly im: Float64Array;
  /** exp(-j 2 pi f n dt) of the next sample. */
  private readonly phasorRe: Float64Array;
  private readonly phasorIm: Float64Array;
  private begun = false;

  constructor(frequenciesHertz: Float64Array, dtSeconds: number, offsets: readonly number[]) {
    this.frequencies = frequenciesHertz;
    this.dtSeconds = dtSeconds;
    this.offsets = offsets;
    this.re = new Float64Array(frequenciesHertz.length * offsets.length);
    this.im = new Float64Array(frequenciesHertz.length * offsets.length);
    this.phasorRe = new Float64Array(frequenciesHertz.length);
    this.phasorIm = new Float64Array(frequenciesHertz.length);
  }

  /**
   * Adds `steps` rows of `block` ([step][channel]); the first row is sample number `firstStep`, which follows the last one
   * added. The phasor is made exact at fixed sample numbers, so that its rotation does not drift over long runs and the
   * same samples give the same bits however they were cut into blocks.
   */
  add(block: Float32Array, firstStep: number, steps: number): void {
    const channels = this.offsets.length;
    for (let k = 0; k < this.frequencies.length; k++) {
      const turn = -2 * Math.PI * this.frequencies[k]! * this.dtSeconds;
      const cos = Math.cos(turn);
      const sin = Math.sin(turn);
      let wr = this.phasorRe[k]!;
      let wi = this.phasorIm[k]!;
      const base = k * channels;
      let at = 0;
      for (let s = 0; s < steps; s++) {
        if ((!this.begun && s === 0) || (firstStep + s) % EXACT_EVERY === 0) {
          wr = Math.cos(turn * (firstStep + s));
          wi = Math.sin(turn * (firstStep + s));
        }
        for (let c = 0; c < channels; c++) {
          const x = block[at++]!;
          this.re[base + c]! += x * wr;
          this.im[base + c]! += x * wi;
        }
        const next = wr * cos - wi * sin;
        wi = wr * sin + wi * cos;
        wr = next;
      }
      this.phasorRe[k] = wr;
      this.phasorIm[k] = wi;
    }
    this.begun ||= steps > 0;
  }

  /** Spectrum of one channel so far. */
  channel(c: number): { re: Float64Array<ArrayBuffer>; im: Float64Array<ArrayBuffer> } {
    const n = this.frequencies.length;
    const re = new Float64Array(n);
    const im = new Float64Array(n);
    for (let k = 0; k < n; k++) {
      const turn = -2 * Math.PI * this.frequencies[k]! * this.dtSeconds * this.offsets[c]!;
      const cos = Math.cos(turn) * this.dtSeconds;
      const sin = Math.sin(turn) * this.dtSeconds;
      const r = this.re[k * this.offsets.length + c]!;
      const i = this.im[k * this.offsets.length + c]!;
      re[k] = r * cos - i * sin;
      im[k] = r * sin + i * cos;
    }
    return { re, im };
  }
}
