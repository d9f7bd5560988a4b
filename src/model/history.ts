// Owns undo and redo as plain data: the jobs before and after, each with the words of the edit between.
// Must not know stores, commands, or the clock.
import type { Job } from './job.ts';

/**
 * record: its own undo step. join: merges with the step before when that has the same key (a drag, a spin).
 * skip: not undoable (loading at start).
 */
export type HistoryPolicy =
  { readonly kind: 'record' } | { readonly kind: 'join'; readonly key: string } | { readonly kind: 'skip' };

interface Step {
  /** The job to return to: before the edit when undoing, after it when redoing. */
  readonly job: Job;
  readonly label: string;
  /** Set while further edits may join this step. */
  readonly key: string | null;
  /** What could be redone before this step began; given back when the step is bailed out of. */
  readonly displaced: readonly Step[];
}

export interface History {
  /** Oldest first; the last is what undo takes back. */
  readonly past: readonly Step[];
  /** The last is what redo brings back. */
  readonly future: readonly Step[];
}

export interface HistoryMove {
  readonly history: History;
  readonly job: Job;
}

export const DEEPEST_HISTORY = 200;

export function makeHistory(): History {
  return { past: [], future: [] };
}

/** History after an edit turned `before` into another job. The label of a joined step is that of its first edit. */
export function recordEdit(history: History, before: Job, label: string, policy: HistoryPolicy): History {
  if (policy.kind === 'skip') return { past: history.past, future: [] };
  const last = history.past.at(-1);
  const joins = policy.kind === 'join' && history.future.length === 0 && last?.key === policy.key;
  if (joins) return history;
  const open = policy.kind === 'join';
  const step: Step = { job: before, label, key: open ? policy.key : null, displaced: open ? history.future : [] };
  return { past: [...history.past, step].slice(-DEEPEST_HISTORY), future: [] };
}

/** No further edit joins the last step. */
export function closeStep(history: History): History {
  const last = history.past.at(-1);
  if (last === undefined || last.key === null) return history;
  return { past: [...history.past.slice(0, -1), { ...last, key: null, displaced: [] }], future: history.future };
}

/** Null when there is nothing to undo. */
export function undoEdit(history: History, now: Job): HistoryMove | null {
  const step = history.past.at(-1);
  if (step === undefined) return null;
  const undone: Step = { job: now, label: step.label, key: null, displaced: [] };
  const before = closeStep({ past: history.past.slice(0, -1), future: [] }).past;
  return { job: step.job, history: { past: before, future: [...history.future, undone] } };
}

/** Null when there is nothing to redo. */
export function redoEdit(history: History, now: Job): HistoryMove | null {
  const step = history.future.at(-1);
  if (step === undefined) return null;
  const redone: Step = { job: now, label: step.label, key: null, displaced: [] };
  return {
    job: step.job,
    history: { past: [...history.past, redone].slice(-DEEPEST_HISTORY), future: history.future.slice(0, -1) },
  };
}

/** Takes back the step still open under `key`, as if it had never been (Escape during a drag); null when there is none. */
export function bailOut(history: History, key: string): HistoryMove | null {
  const step = history.past.at(-1);
  if (step === undefined || step.key !== key) return null;
  return { job: step.job, history: { past: history.past.slice(0, -1), future: step.displaced } };
}

/** What the next undo would take back, in words. */
export function undoLabel(history: History): string | null {
  return history.past.at(-1)?.label ?? null;
}

export function redoLabel(history: History): string | null {
  return history.future.at(-1)?.label ?? null;
}
