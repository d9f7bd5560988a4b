// Owns the running discrete Fourier transform of recorded channels, in double precision.
// Must not know what the channels mean beyond their time offset.

/** Channels come in threes (the components of a probe) or alone (a drive). */
const TRIPLE = 3;
/** The table of phasors may have this many entries; its rows are as long as that allows. */
const MOST_ENTRIES = 1 << 19;
const LONGEST_ROW = 64;

/** exp(-j 2 pi f m dt) for the samples m of a block; one table serves all channels of a run. */
export class PhasorTable {
  /** Phase of one step, rad, per frequency. */
  readonly turns: Float64Array;
  readonly dtSeconds: number;
  /** Samples in a block. */
  readonly length: number;
  /** By [frequency][m]. */
  readonly cos: Float64Array;
  readonly sin: Float64Array;

  constructor(frequenciesHertz: Float64Array, dtSeconds: number) {
    const count = frequenciesHertz.length;
    this.dtSeconds = dtSeconds;
    this.turns = frequenciesHertz.map((frequency) => -2 * Math.PI * frequency * dtSeconds);
    this.length = Math.max(1, Math.min(LONGEST_ROW, Math.floor(MOST_ENTRIES / Math.max(1, count))));
    this.cos = new Float64Array(count * this.length);
    this.sin = new Float64Array(count * this.length);
    this.turns.forEach((turn, k) => {
      // A rotation of at most LONGEST_ROW steps drifts by some 1e-14.
      const [stepRe, stepIm] = [Math.cos(turn), Math.sin(turn)];
      let [re, im] = [1, 0];
      for (let at = k * this.length; at < (k + 1) * this.length; at++) {
        this.cos[at] = re;
        this.sin[at] = im;
        [re, im] = [re * stepRe - im * stepIm, re * stepIm + im * stepRe];
      }
    });
  }
}

/**
 * Accumulates X(f) = dt sum x[n] exp(-j 2 pi f (n + offset) dt) over samples as they come, exp(+jwt) convention.
 * `offsets` gives each channel's time offset in steps (0 for u, 1/2 for in-plane fields).
 *
 * Samples are summed against a table of phasors in blocks that begin at fixed sample numbers, and a block's sum is turned by
 * the exact phasor of its first sample: nothing drifts over long runs, and the same samples give the same bits however they
 * were cut into calls.
 */
export class RunningDft {
  private readonly phasors: PhasorTable;
  private readonly offsets: readonly number[];
  /** By [frequency][channel]: blocks that are whole, and the one under way, not yet turned. */
  private readonly re: Float64Array;
  private readonly im: Float64Array;
  private readonly blockRe: Float64Array;
  private readonly blockIm: Float64Array;
  private blockStart = 0;

  constructor(phasors: PhasorTable, offsets: readonly number[]) {
    this.phasors = phasors;
    this.offsets = offsets;
    const sums = (): Float64Array => new Float64Array(phasors.turns.length * offsets.length);
    [this.re, this.im, this.blockRe, this.blockIm] = [sums(), sums(), sums(), sums()];
  }

  /**
   * Adds `steps` rows of `block` ([step][channel]); the first row is sample number `firstStep`, which follows the last one
   * added.
   */
  add(block: Float32Array, firstStep: number, steps: number): void {
    const { length } = this.phasors;
    for (let done = 0; done < steps;) {
      const from = (firstStep + done) % length;
      const to = Math.min(length, from + steps - done);
      this.blockStart = firstStep + done - from;
      if (this.offsets.length % TRIPLE === 0) this.addTriples(block, done, from, to);
      else this.addSingles(block, done, from, to);
      done += to - from;
      if (to === length) this.closeBlock();
    }
  }

  /** Spectrum of one channel so far. */
  channel(c: number): { re: Float64Array<ArrayBuffer>; im: Float64Array<ArrayBuffer> } {
    const { turns, dtSeconds } = this.phasors;
    const n = turns.length;
    const re = new Float64Array(n);
    const im = new Float64Array(n);
    for (let k = 0; k < n; k++) {
      const at = k * this.offsets.length + c;
      const turn = turns[k]!;
      const [wr, wi] = [Math.cos(turn * this.blockStart), Math.sin(turn * this.blockStart)];
      const r = this.re[at]! + (this.blockRe[at]! * wr - this.blockIm[at]! * wi);
      const i = this.im[at]! + (this.blockRe[at]! * wi + this.blockIm[at]! * wr);
      const cos = Math.cos(turn * this.offsets[c]!) * dtSeconds;
      const sin = Math.sin(turn * this.offsets[c]!) * dtSeconds;
      re[k] = r * cos - i * sin;
      im[k] = r * sin + i * cos;
    }
    return { re, im };
  }

  /** Three channels at once share each phasor, and their sums stay in registers. */
  private addTriples(block: Float32Array, row: number, from: number, to: number): void {
    const { blockRe, blockIm } = this;
    const { cos, sin, length, turns } = this.phasors;
    const channels = this.offsets.length;
    for (let k = 0; k < turns.length; k++) {
      for (let c = 0; c < channels; c += TRIPLE) {
        const at = k * channels + c;
        let [r0, r1, r2] = [blockRe[at]!, blockRe[at + 1]!, blockRe[at + 2]!];
        let [i0, i1, i2] = [blockIm[at]!, blockIm[at + 1]!, blockIm[at + 2]!];
        let sample = row * channels + c;
        for (let m = k * length + from; m < k * length + to; m++) {
          const wr = cos[m]!;
          const wi = sin[m]!;
          const x = block[sample]!;
          const y = block[sample + 1]!;
          const z = block[sample + 2]!;
          r0 += x * wr;
          i0 += x * wi;
          r1 += y * wr;
          i1 += y * wi;
          r2 += z * wr;
          i2 += z * wi;
          sample += channels;
        }
        blockRe[at] = r0;
        blockRe[at + 1] = r1;
        blockRe[at + 2] = r2;
        blockIm[at] = i0;
        blockIm[at + 1] = i1;
        blockIm[at + 2] = i2;
      }
    }
  }

  private addSingles(block: Float32Array, row: number, from: number, to: number): void {
    const { blockRe, blockIm } = this;
    const { cos, sin, length, turns } = this.phasors;
    const channels = this.offsets.length;
    for (let k = 0; k < turns.length; k++) {
      for (let c = 0; c < channels; c++) {
        const at = k * channels + c;
        let r = blockRe[at]!;
        let i = blockIm[at]!;
        for (let m = from; m < to; m++) {
          const x = block[(row + m - from) * channels + c]!;
          r += x * cos[k * length + m]!;
          i += x * sin[k * length + m]!;
        }
        blockRe[at] = r;
        blockIm[at] = i;
      }
    }
  }

  private closeBlock(): void {
    const { turns } = this.phasors;
    const channels = this.offsets.length;
    for (let k = 0; k < turns.length; k++) {
      const wr = Math.cos(turns[k]! * this.blockStart);
      const wi = Math.sin(turns[k]! * this.blockStart);
      for (let at = k * channels; at < (k + 1) * channels; at++) {
        const r = this.blockRe[at]!;
        const i = this.blockIm[at]!;
        this.re[at]! += r * wr - i * wi;
        this.im[at]! += r * wi + i * wr;
      }
    }
    this.blockRe.fill(0);
    this.blockIm.fill(0);
  }
}
