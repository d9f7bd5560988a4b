// Owns the job being edited, its history, and the one door through which it changes.
// Must not know React components or workers.
import type { AppError, Result } from '../base/result.ts';
import type { Command } from '../model/commands.ts';
import type { Job, ResolvedJob } from '../model/job.ts';

/**
 * record: its own undo step. join: merges with the step before when that has the same key (a drag, a spin).
 * skip: not undoable (loading at start).
 */
export type HistoryPolicy = { readonly kind: 'record' } | { readonly kind: 'join'; readonly key: string } | { readonly kind: 'skip' };

export interface JobState {
  readonly job: Job;
  /** The job in numbers, or why it has none (an expression that fails); recomputed on every change. */
  readonly resolved: Result<ResolvedJob>;
  readonly canUndo: boolean;
  readonly canRedo: boolean;
  /** What the next undo would take back, in words ("move Wall A"). */
  readonly undoLabel: string | null;
  readonly redoLabel: string | null;
  readonly saved: 'saved' | 'saving' | 'not saved';
  /** Last refused edit; shown near its place, cleared by the next good one. */
  readonly refusal: AppError | null;
  dispatch(command: Command, policy?: HistoryPolicy): Result<Job>;
  undo(): void;
  redo(): void;
  /** Undoes an open join step (Escape during a drag). */
  bail(key: string): void;
  dismissRefusal(): void;
}
