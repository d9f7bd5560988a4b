// Owns what is said of the job before and beside its run: the estimate, and why it cannot be run or what broke.
// Must not know solvers, or how a run is followed.
import type { AppError } from '../base/result.ts';
import { makeEstimate } from '../engine/estimate.ts';
import { useJobStore } from './job-store.ts';
import { useRunStore } from './run-store.ts';

export class Outlook {
  private readonly nextFrame: () => Promise<void>;
  private ofJob: readonly AppError[] = [];
  private ofRun: readonly AppError[] = [];
  private estimating = false;

  constructor(nextFrame: () => Promise<void>) {
    this.nextFrame = nextFrame;
  }

  /** Estimates the job as it stands; once a frame is enough while a wall is dragged. */
  async estimateSoon(megaCellsPerSecond: () => number): Promise<void> {
    if (this.estimating) return;
    this.estimating = true;
    await this.nextFrame();
    this.estimating = false;
    const { resolved } = useJobStore.getState();
    const estimate = resolved.ok ? makeEstimate(resolved.value, megaCellsPerSecond()) : resolved;
    this.ofJob = estimate.ok ? [] : estimate.errors;
    useRunStore.setState({ estimate: estimate.ok ? estimate.value : null });
    this.publish();
  }

  /** What went wrong with the run; none takes back what was said before. */
  tell(errors: readonly AppError[]): void {
    this.ofRun = errors;
    this.publish();
  }

  /** What the estimate already says of the job is not said twice. */
  private publish(): void {
    const said = new Set(this.ofJob.map((error) => error.message));
    useRunStore.setState({ errors: [...this.ofJob, ...this.ofRun.filter((error) => !said.has(error.message))] });
  }
}
