// Owns the words exchanged with a run session: what is asked, what comes back. Plain cloneable data only.
// Must not know React, stores, or whether the session lives in a Web Worker or in this process.
import type { Result } from '../src/base/result.ts';
import type { Estimate } from '../src/engine/estimate.ts';
import type { Job } from '../src/model/job.ts';

/** Out-of-plane field first, then the in-plane pair. */
export type FieldComponent = 'Ez' | 'Hx' | 'Hy' | 'Hz' | 'Ex' | 'Ey';
/** What the sheet can show: one component, or the magnitude of the E or H vector. */
export type FieldView = FieldComponent | '|E|' | '|H|';

export type RunRole = 'main' | 'reference';

export type StopReason = 'decayed' | 'time limit' | 'stopped by the person' | 'not finite' | 'growing' | 'broken';

/** Instantaneous field over the sheet (absorbers not included), row-major, bottom row first, V/m or A/m. */
export interface FieldFrame {
  readonly view: FieldView;
  readonly width: number;
  readonly height: number;
  readonly values: Float32Array<ArrayBuffer>;
  readonly step: number;
  readonly timeSeconds: number;
  /** Largest magnitude in the frame. */
  readonly peak: number;
}

export interface RunProgress {
  readonly state: 'ready' | 'running' | 'held' | 'done';
  readonly step: number;
  /** Steps at the time limit. */
  readonly stepLimit: number;
  readonly timeSeconds: number;
  /** Energy on the sheet below its peak so far, dB (0 or negative). */
  readonly energyDb: number;
  /** Million cell updates a second over the last stretch. */
  readonly megaCellsPerSecond: number;
  /** Threads that work on it by now. */
  readonly threads: number;
  readonly secondsLeft: number;
  readonly stopReason: StopReason | null;
  /** Set when stopReason is 'not finite', 'growing' or 'broken': step, place and likely cause in words. */
  readonly trouble: string | null;
}

/** Samples of one probe, all three components at times n * dt (see engine README, "Probes"). */
export interface ProbeTrace {
  readonly probeId: string;
  /** One array per component, in the order of `RunSummary.components`. */
  readonly samples: readonly [Float32Array<ArrayBuffer>, Float32Array<ArrayBuffer>, Float32Array<ArrayBuffer>];
}

/** Complex spectra, exp(+jwt), peak values: integral of f(t) exp(-jwt) dt, in V/m/Hz or A/m/Hz. */
export interface ProbeSpectrum {
  readonly probeId: string;
  /** One [re, im] pair of arrays per component, each as long as `RunRecord.frequenciesHertz`. */
  readonly components: readonly { readonly re: Float64Array<ArrayBuffer>; readonly im: Float64Array<ArrayBuffer> }[];
}

/** A finished (or stopped) run, complete enough to export and to compare. */
export interface RunRecord {
  readonly role: RunRole;
  /** Hash of everything that decides the numbers. */
  readonly planHash: string;
  readonly components: readonly [FieldComponent, FieldComponent, FieldComponent];
  readonly dtSeconds: number;
  readonly steps: number;
  readonly stopReason: StopReason;
  readonly trouble: string | null;
  readonly energyDb: number;
  readonly wallSeconds: number;
  /** Threads that worked on it at the end; the numbers do not depend on it. */
  readonly threads: number;
  readonly megaCellsPerSecond: number;
  readonly estimate: Estimate;
  /** The even band and the listed frequencies, merged, rising, without repeats. */
  readonly frequenciesHertz: Float64Array<ArrayBuffer>;
  readonly traces: readonly ProbeTrace[];
  readonly spectra: readonly ProbeSpectrum[];
  /** Spectrum of the unit drive waveform over the same record, for the floor of H(f). */
  readonly driveSpectrum: { readonly re: Float64Array<ArrayBuffer>; readonly im: Float64Array<ArrayBuffer> };
}

export interface SessionReport {
  readonly progress: RunProgress;
  /** Present when asked for. */
  readonly frame: FieldFrame | null;
  /** Samples since `sinceStep`, one entry per probe; none when that is Infinity. */
  readonly traces: readonly ProbeTrace[];
  readonly sinceStep: number;
}

/**
 * A run session. `open` builds the plan and leaves the field at t = 0; `start` returns at once and steps in slices;
 * `poll` is how everything streams out: the caller sets the pace, so a slow page never slows the run.
 */
export interface SessionApi {
  /** Loads and starts at once what runs on up to so many threads will want, so that nothing has to be fetched later. */
  prepare(threads: number): Promise<void>;
  /** `threads` is how many may work on the run, 1 when left out; where memory cannot be shared it is one. */
  open(job: Job, role: RunRole, threads?: number): Promise<Result<Estimate>>;
  start(): Promise<void>;
  hold(): Promise<void>;
  /** One time step while held or ready. */
  stepOnce(): Promise<void>;
  /** Back to t = 0 with the same plan. */
  rewind(): Promise<void>;
  /** Ends the run; the record holds what there is. */
  stop(): Promise<void>;
  /** `stepsPerSecond` limits the pace for watching; Infinity runs free. */
  setPace(stepsPerSecond: number): Promise<void>;
  poll(request: { view: FieldView | null; maxWidth: number; maxHeight: number; sinceStep: number }): Promise<SessionReport>;
  /** The record as it stands (spectra included); errors when nothing is open. */
  record(): Promise<Result<RunRecord>>;
}
