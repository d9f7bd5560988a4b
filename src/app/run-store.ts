// Owns the state of the run shown: progress, live traces, finished records, and the run book.
// Must not know React components or the worker client (the run controller feeds this store).
import { create } from 'zustand';
import type { FieldComponent, ProbeTrace, RunProgress, RunRecord } from '../../workers/protocol.ts';
import type { AppError } from '../base/result.ts';
import type { Estimate } from '../engine/estimate.ts';
import type { Job } from '../model/job.ts';

/** A run kept in the run book, with the job it answered. */
export interface KeptRun {
  readonly id: string;
  readonly name: string;
  readonly keptAt: string;
  readonly job: Job;
  readonly main: RunRecord;
  readonly reference: RunRecord | null;
  /** Drawn with the current run's readings. */
  readonly overlaid: boolean;
}

export interface RunState {
  readonly progress: RunProgress;
  /** Estimate of the plan that is open, or of the job as edited when nothing is. */
  readonly estimate: Estimate | null;
  /** Why the job cannot be run, or what broke. */
  readonly errors: readonly AppError[];
  /** True when the job has been edited since the run shown was started. */
  readonly stale: boolean;
  readonly components: readonly [FieldComponent, FieldComponent, FieldComponent] | null;
  /** Samples so far of the run under way, one per probe; `liveCount` valid samples in each array. */
  readonly liveTraces: readonly ProbeTrace[];
  readonly liveCount: number;
  readonly main: RunRecord | null;
  readonly reference: RunRecord | null;
  /** State of the reference run that belongs to the run shown. */
  readonly referenceState: 'none' | 'running' | 'done' | 'failed';
  /** The job that `main` answers. */
  readonly answeredJob: Job | null;
  readonly kept: readonly KeptRun[];
}

/** What the person can do with the run; implemented by the run controller. */
export interface RunActions {
  run(): Promise<void>;
  hold(): Promise<void>;
  resume(): Promise<void>;
  stepOnce(): Promise<void>;
  backToStart(): Promise<void>;
  stop(): Promise<void>;
  setPace(stepsPerSecond: number): Promise<void>;
  keep(name?: string): void;
  renameKept(id: string, name: string): void;
  overlayKept(id: string, on: boolean): void;
  removeKept(id: string): void;
  /** Puts the kept run's job back on the sheet (undoable) and its readings on show. */
  reopenKept(id: string): void;
}

export const NO_PROGRESS: RunProgress = {
  state: 'ready',
  step: 0,
  stepLimit: 0,
  timeSeconds: 0,
  energyDb: 0,
  megaCellsPerSecond: 0,
  threads: 1,
  secondsLeft: 0,
  stopReason: null,
  trouble: null,
};

export const useRunStore = create<RunState>()(() => ({
  progress: NO_PROGRESS,
  estimate: null,
  errors: [],
  stale: false,
  components: null,
  liveTraces: [],
  liveCount: 0,
  main: null,
  reference: null,
  referenceState: 'none',
  answeredJob: null,
  kept: [],
}));
