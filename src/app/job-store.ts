// Owns the job being edited, its history, and the one door through which it changes.
// Must not know React components or workers.
import { create } from 'zustand';
import type { AppError, Result } from '../base/result.ts';
import type { Command } from '../model/commands.ts';
import { applyCommand } from '../model/commands.ts';
import { describeCommand } from '../model/describe-command.ts';
import type { History, HistoryMove, HistoryPolicy } from '../model/history.ts';
import { bailOut, makeHistory, recordEdit, redoEdit, redoLabel, undoEdit, undoLabel } from '../model/history.ts';
import type { Job, ResolvedJob } from '../model/job.ts';
import { makeEmptyJob } from '../model/new-job.ts';
import { resolveJob } from '../model/resolve-job.ts';

export type { HistoryPolicy } from '../model/history.ts';

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

type Shown = Pick<JobState, 'canUndo' | 'canRedo' | 'undoLabel' | 'redoLabel'>;

function showHistory(history: History): Shown {
  return {
    canUndo: history.past.length > 0,
    canRedo: history.future.length > 0,
    undoLabel: undoLabel(history),
    redoLabel: redoLabel(history),
  };
}

export const useJobStore = create<JobState>()((set, get) => {
  let history = makeHistory();

  /** The only place where the job is put. */
  const show = (job: Job, next: History): void => {
    history = next;
    const resolved = job === get().job ? get().resolved : resolveJob(job);
    set({ job, resolved, refusal: null, ...showHistory(next) });
  };
  const follow = (move: HistoryMove | null): void => {
    if (move !== null) show(move.job, move.history);
  };

  const job = makeEmptyJob();
  return {
    job,
    resolved: resolveJob(job),
    ...showHistory(history),
    saved: 'saved',
    refusal: null,
    dispatch: (command, policy = { kind: 'record' }) => {
      const before = get().job;
      const applied = applyCommand(before, command);
      if (!applied.ok) set({ refusal: applied.errors[0] });
      else if (applied.value === before) set({ refusal: null });
      else show(applied.value, recordEdit(history, before, describeCommand(before, command), policy));
      return applied;
    },
    undo: () => follow(undoEdit(history, get().job)),
    redo: () => follow(redoEdit(history, get().job)),
    bail: (key) => follow(bailOut(history, key)),
    dismissRefusal: () => set({ refusal: null }),
  };
});
