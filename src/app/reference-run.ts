// Owns the reference run beside the run shown: whether one is needed, running it, remembering what it gave.
// Must not know the run shown, React components, or how the insertion ratio is made.
import type { AppError, Result } from '../base/result.ts';
import { fail, ok } from '../base/result.ts';
import type { RunRecord, SessionApi } from '../../workers/protocol.ts';
import type { Estimate } from '../engine/estimate.ts';
import type { Job, ResolvedJob } from '../model/job.ts';
import { wantsReference } from '../model/reference.ts';
import { makeReferenceKey } from './run-question.ts';
import type { SolverSeat } from './solver-seat.ts';
import { untilDone } from './until-done.ts';

export type ReferenceState = 'none' | 'running' | 'done' | 'failed';

/** Records remembered: a person goes back and forth between a few references, and each may take megabytes. */
const MOST_REMEMBERED = 6;
const LOOK_MILLISECONDS = 60;

export class ReferenceRun {
  state: ReferenceState = 'none';
  record: RunRecord | null = null;
  errors: readonly AppError[] = [];
  private job: Job | null = null;
  private turn = 0;
  private readonly remembered = new Map<string, RunRecord>();
  private readonly seat: SolverSeat;
  private readonly threads: () => number;
  private readonly wait: (milliseconds: number) => Promise<void>;
  private readonly onChange: () => void;

  constructor(seat: SolverSeat, threads: () => number, wait: (milliseconds: number) => Promise<void>, onChange: () => void) {
    this.seat = seat;
    this.threads = threads;
    this.wait = wait;
    this.onChange = onChange;
  }

  /** Whether `follow` would have to run something for this job. */
  isNeeded(job: Job, resolved: ResolvedJob, estimate: Estimate): boolean {
    return wantsReference(job) && !this.remembered.has(makeReferenceKey(resolved, estimate));
  }

  /** Nothing to do when `job` has its reference already, or it is under way. */
  async follow(job: Job, resolved: ResolvedJob, estimate: Estimate): Promise<void> {
    if (this.job === job) return;
    this.job = job;
    const turn = ++this.turn;
    void this.stop();
    if (!wantsReference(job)) return this.settle('none', null);
    const key = makeReferenceKey(resolved, estimate);
    const known = this.remembered.get(key);
    if (known !== undefined) return this.settle('done', known);
    this.settle('running', null);
    const result = await this.run(job, turn);
    if (turn !== this.turn || result === null) return;
    if (result.ok && result.value.trouble !== null) {
      this.job = null;
      if (result.value.stopReason === 'broken') this.seat.clear();
      this.errors = [{ code: 'not finite', message: `The reference run broke: ${result.value.trouble}` }];
      return this.settle('failed', null);
    }
    if (!result.ok) {
      this.job = null;
      this.errors = result.errors;
      return this.settle('failed', null);
    }
    if (isWhole(result.value)) this.remember(key, result.value);
    else this.job = null;
    this.settle('done', result.value);
  }

  async hold(): Promise<void> {
    await this.ask((api) => api.hold());
  }

  async resume(): Promise<void> {
    await this.ask((api) => api.start());
  }

  /** Ends it with what there is. */
  async stop(): Promise<void> {
    await this.ask((api) => api.stop());
  }

  /** Gives up the run under way; the next job starts afresh. */
  forget(): void {
    this.turn += 1;
    this.job = null;
    if (this.state === 'running') this.seat.clear();
    this.state = 'none';
    this.record = null;
  }

  /** A solver that has died is told of by the run itself. */
  private async ask(question: (api: SessionApi) => Promise<void>): Promise<void> {
    if (this.state === 'running') await question(this.seat.api).catch(() => undefined);
  }

  /** Null when another run has taken over meanwhile. */
  private async run(job: Job, turn: number): Promise<Result<RunRecord> | null> {
    try {
      const { api } = this.seat;
      const opened = await api.open(job, 'reference', this.threads());
      if (turn !== this.turn) return null;
      if (!opened.ok) return opened;
      await api.start();
      const ended = await untilDone(
        api,
        () => this.wait(LOOK_MILLISECONDS),
        () => turn !== this.turn,
      );
      if (!ended) return null;
      const record = await api.record();
      return turn === this.turn ? (record.ok ? ok(record.value) : record) : null;
    } catch (error) {
      this.seat.clear();
      return fail({
        code: 'solver',
        message: `The reference run broke off: ${error instanceof Error ? error.message : String(error)}`,
        hint: 'Run again; the readings without a reference are not touched.',
      });
    }
  }

  private settle(state: ReferenceState, record: RunRecord | null): void {
    this.state = state;
    this.record = record;
    if (state !== 'failed') this.errors = [];
    this.onChange();
  }

  private remember(key: string, record: RunRecord): void {
    this.remembered.set(key, record);
    const oldest = this.remembered.keys().next().value;
    if (this.remembered.size > MOST_REMEMBERED && oldest !== undefined) this.remembered.delete(oldest);
  }
}

/** What was stopped or broke would answer for another run with less than it asks. */
function isWhole(record: RunRecord): boolean {
  return record.stopReason === 'decayed' || record.stopReason === 'time limit';
}
