// Owns one run in memory: a plan's image in a kernel, stepped slice by slice, with its records and spectra.
// Must not know workers, messages, clocks or pages.
import type { Result } from '../src/base/result.ts';
import { fail, ok } from '../src/base/result.ts';
import type { RowSampling } from '../src/engine/frame.ts';
import { PICTURE_MOST, PICTURE_ROW, SYNC_READY } from '../src/engine/layout.ts';
import { feedInto } from '../src/engine/plane-wave.ts';
import type { RunPlan } from '../src/engine/plan.ts';
import { PhasorTable, RunningDft } from '../src/engine/spectrum.ts';
import { waveformAt, waveformSilence } from '../src/engine/waveform.ts';
import { kernelImports } from './kernel-imports.mjs';
import type { ThreadPool } from './thread-pool.ts';

interface KernelExports {
  advance(base: number, steps: number): void;
  energy(base: number): number;
  dismiss(): void;
  samplePairs(out: number, a: number, b: number, count: number, scale: number): number;
  sampleMagnitudes(
    out: number,
    a: number,
    b: number,
    c: number,
    d: number,
    count: number,
    scaleX: number,
    scaleY: number,
  ): number;
}

const PAGE = 65536;
/** The image begins one page in: the kernel keeps its own few words below. */
const BASE = PAGE;

/**
 * A run at t = 0. With a pool and a plan for several threads its memory is shared, and `kernel` must be the build for that.
 * Fails when the memory cannot be had.
 */
export function openRun(plan: RunPlan, kernel: WebAssembly.Module, pool: ThreadPool | null = null): Result<Run> {
  const shared = pool !== null && plan.threads > 1;
  const pages = 1 + Math.ceil(plan.imageBytes / PAGE);
  let memory: WebAssembly.Memory;
  try {
    memory = new WebAssembly.Memory(shared ? { initial: pages, maximum: pages, shared } : { initial: pages });
  } catch {
    return fail({
      code: 'no memory',
      path: 'grid.cells',
      message: `The ${(plan.imageBytes / 2 ** 20).toFixed(0)} MB of this job could not be had from the machine.`,
      hint: 'Close other pages, or take larger cells.',
    });
  }
  // At once: the asynchronous way waits some 20 ms for the compiler's own tasks.
  const instance = new WebAssembly.Instance(kernel, { env: kernelImports(memory) });
  if (shared) pool.serve({ kernel, memory, base: BASE }, plan.threads - 1);
  return ok(new Run(plan, memory.buffer, instance.exports as unknown as KernelExports));
}

function rowsOf(kernel: KernelExports, buffer: ArrayBufferLike): RowSampling {
  const row = new Float32Array(buffer, PICTURE_ROW, PICTURE_MOST);
  const place = (first: number): number => BASE + 4 * first;
  return {
    most: PICTURE_MOST - 4,
    pairs(values, at, count, first, apart, scale) {
      const peak = kernel.samplePairs(PICTURE_ROW, place(first), place(first + apart), count, scale);
      values.set(row.subarray(0, count), at);
      return peak;
    },
    magnitudes(values, at, count, x, y, [toX, toY]) {
      const [a, b, c, d] = [x.first, x.first + x.apart, y.first, y.first + y.apart].map(place) as [
        number,
        number,
        number,
        number,
      ];
      const peak = kernel.sampleMagnitudes(PICTURE_ROW, a, b, c, d, count, toX, toY);
      values.set(row.subarray(0, count), at);
      return peak;
    },
  };
}

export class Run {
  readonly plan: RunPlan;
  /** The whole image as float32, offset 0 being its start. */
  readonly image: Float32Array;
  /** Rows of pictures, sampled by the kernel. */
  readonly rows: RowSampling;
  /** Steps done. u stands at step * dt, in-plane fields half a step later. */
  step = 0;
  /** Samples per channel, index n at time n * dt; in-plane channels aligned to u by the mean of the half steps round it. */
  private traces: Float32Array<ArrayBuffer>[];
  private readonly kernel: KernelExports;
  private readonly buffer: ArrayBufferLike;
  private readonly phasors: PhasorTable;
  private dft: RunningDft;
  private driveDft: RunningDft;

  constructor(plan: RunPlan, buffer: ArrayBufferLike, kernel: KernelExports) {
    this.plan = plan;
    this.kernel = kernel;
    this.buffer = buffer;
    this.image = new Float32Array(buffer, BASE, Math.floor(plan.imageBytes / 4));
    this.rows = rowsOf(kernel, buffer);
    this.traces = [];
    this.phasors = new PhasorTable(plan.frequenciesHertz, plan.dtSeconds);
    this.dft = new RunningDft(
      this.phasors,
      plan.probeIds.flatMap(() => [0, 0.5, 0.5]),
    );
    this.driveDft = new RunningDft(this.phasors, [0]);
    this.rewind();
  }

  /** Back to t = 0. */
  rewind(): void {
    const { plan, buffer } = this;
    new Uint8Array(buffer, BASE, plan.fixedOffset).fill(0);
    new Int32Array(buffer, BASE, plan.header.length).set(plan.header);
    new Uint8Array(buffer, BASE + plan.fixedOffset, plan.fixed.byteLength).set(new Uint8Array(plan.fixed));
    this.step = 0;
    this.traces = Array.from({ length: 3 * plan.probeIds.length }, () => new Float32Array(1024));
    this.dft = new RunningDft(
      this.phasors,
      plan.probeIds.flatMap(() => [0, 0.5, 0.5]),
    );
    this.driveDft = new RunningDft(this.phasors, [0]);
  }

  /** Does `steps` steps (at most the plan's slice) and records them. */
  advance(steps: number): void {
    const { plan, buffer } = this;
    const { sources, feeds, dtSeconds } = plan;
    const table = new Float64Array(buffer, BASE + plan.sourceTableOffset, plan.slice * Math.max(1, sources.length));
    for (let s = 0; s < steps; s++) {
      const t = (this.step + 1 + s) * dtSeconds;
      // A current acts between the two values of u it changes.
      sources.forEach((waveform, k) => (table[s * sources.length + k] = waveformAt(waveform, t - dtSeconds / 2)));
    }
    for (const feed of feeds) {
      const values = new Float64Array(buffer, BASE + feed.tableOffset, plan.slice * feed.fed);
      for (let s = 0; s < steps; s++) feedInto(values, s * feed.fed, feed, (this.step + 1 + s) * dtSeconds);
    }
    this.kernel.advance(BASE, steps);
    this.record(steps);
    this.step += steps;
  }

  /** Threads that work on the run by now. */
  get threads(): number {
    return Math.min(this.plan.threads, 1 + new Int32Array(this.buffer, SYNC_READY, 1)[0]!);
  }

  /** Sends helper threads home; the run is not to be advanced after that. */
  close(): void {
    this.kernel.dismiss();
  }

  /** Discrete energy in kernel units; only ratios mean anything. */
  energy(): number {
    return this.kernel.energy(BASE);
  }

  /** Samples `from` to the last of one channel (a copy). */
  traceFrom(channel: number, from: number): Float32Array<ArrayBuffer> {
    return this.traces[channel]!.slice(Math.min(from, this.step + 1), this.step + 1);
  }

  spectrum(channel: number): { re: Float64Array<ArrayBuffer>; im: Float64Array<ArrayBuffer> } {
    return this.dft.channel(channel);
  }

  driveSpectrum(): { re: Float64Array<ArrayBuffer>; im: Float64Array<ArrayBuffer> } {
    return this.driveDft.channel(0);
  }

  /** First place where u is not a finite number, in unknowns of the grid, or null. */
  firstNotFinite(): { i: number; j: number } | null {
    const { fields } = this.plan;
    for (let j = 0; j < fields.countY; j++) {
      const row = (fields.uOffset >> 2) + (j + 1) * fields.stride + 4;
      for (let i = 0; i < fields.countX; i++) if (!Number.isFinite(this.image[row + i]!)) return { i, j };
    }
    return null;
  }

  private record(steps: number): void {
    const { plan } = this;
    const channels = 3 * plan.probeIds.length;
    const block = this.image.subarray(plan.recordOffset >> 2, (plan.recordOffset >> 2) + steps * channels);
    const first = this.step + 1;
    for (let c = 0; c < channels; c++) {
      const trace = this.roomFor(c, first + steps);
      const half = c % 3 !== 0;
      for (let s = 0; s < steps; s++) {
        const raw = block[s * channels + c]!;
        // Between slices the last half-step value waits one place ahead of the aligned ones.
        trace[first + s] = half ? (trace[first + s]! + raw) / 2 : raw;
        if (half) trace[first + s + 1] = raw;
      }
    }
    this.dft.add(block, first, steps);
    this.recordDrive(first, steps);
  }

  private recordDrive(first: number, steps: number): void {
    const { driveWaveform, dtSeconds } = this.plan;
    if (driveWaveform === null) return;
    const last = Math.min(first + steps - 1, Math.floor(waveformSilence(driveWaveform) / dtSeconds));
    if (last < first) return;
    const drive = Float32Array.from({ length: last - first + 1 }, (_, s) => waveformAt(driveWaveform, (first + s) * dtSeconds));
    this.driveDft.add(drive, first, drive.length);
  }

  private roomFor(channel: number, lastStep: number): Float32Array<ArrayBuffer> {
    const trace = this.traces[channel]!;
    if (trace.length > lastStep + 1) return trace;
    const grown = new Float32Array(2 * lastStep + 2);
    grown.set(trace);
    this.traces[channel] = grown;
    return grown;
  }
}
