// Owns a solver that computes nothing and answers as told, for tests of what stands around a solver.
// Must not know the engine.
import type { AppError } from '../../../src/base/result.ts';
import { fail, ok } from '../../../src/base/result.ts';
import type { Estimate } from '../../../src/engine/estimate.ts';
import type { Job } from '../../../src/model/job.ts';
import type { FieldView, RunProgress, RunRecord, RunRole, SessionApi, StopReason } from '../../../workers/protocol.ts';

export const ESTIMATE: Estimate = {
  cellsX: 180,
  cellsY: 90,
  cellsTotal: 23256,
  dxMetres: 1e-3,
  dyMetres: 1e-3,
  dtSeconds: 2e-12,
  stepLimit: 1000,
  memoryBytes: 1e6,
  secondsAtMost: 0.1,
  cellsPerShortestWavelength: 20,
  phaseErrorDegrees: 1,
  launch: null,
  remarks: [],
};

/** A record of one probe whose samples are 0, 1, 2... */
export function makeRecord(role: RunRole, steps = 10, stopReason: StopReason = 'decayed'): RunRecord {
  const samples = (): Float32Array<ArrayBuffer> => Float32Array.from({ length: steps + 1 }, (_, n) => n);
  const spectrum = () => ({ re: Float64Array.of(1, 2), im: Float64Array.of(0, 0) });
  return {
    role,
    planHash: `${role} plan`,
    components: ['Ez', 'Hx', 'Hy'],
    dtSeconds: ESTIMATE.dtSeconds,
    steps,
    stopReason,
    trouble: null,
    energyDb: -60,
    wallSeconds: 0.01,
    threads: 1,
    megaCellsPerSecond: 250,
    estimate: ESTIMATE,
    frequenciesHertz: Float64Array.of(1e9, 6e9),
    traces: [{ probeId: 'probe-1', samples: [samples(), samples(), samples()] }],
    spectra: [{ probeId: 'probe-1', components: [spectrum(), spectrum(), spectrum()] }],
    driveSpectrum: spectrum(),
  };
}

/** Advances by `stride` steps with every look at it while it runs, and ends at `end`. */
export class FakeSolver implements SessionApi {
  readonly calls: string[] = [];
  readonly views: (FieldView | null)[] = [];
  /** Threads offered with each opening. */
  readonly threads: number[] = [];
  openError: AppError | null = null;
  /** Set to make every further call fail, as those to a dead worker do. */
  dead: Error | null = null;
  looksAtOnce = 0;
  mostLooksAtOnce = 0;
  closed = false;
  private readonly end: number;
  private readonly stride: number;
  private role: RunRole = 'main';
  private step = 0;
  private state: RunProgress['state'] = 'ready';
  private stopReason: StopReason | null = null;

  constructor(end = 40, stride = 10) {
    this.end = end;
    this.stride = stride;
  }

  private async call(name: string): Promise<void> {
    this.calls.push(name);
    await Promise.resolve();
    if (this.dead !== null) throw this.dead;
  }

  async prepare() {
    await this.call('prepare');
  }

  async open(_job: Job, role: RunRole, threads = 1) {
    this.threads.push(threads);
    await this.call(`open ${role}`);
    if (this.openError !== null) return fail<Estimate>(this.openError);
    this.role = role;
    this.step = 0;
    this.state = 'ready';
    this.stopReason = null;
    return ok(ESTIMATE);
  }

  async start() {
    await this.call('start');
    if (this.state !== 'done') this.state = 'running';
  }

  async hold() {
    await this.call('hold');
    if (this.state === 'running') this.state = 'held';
  }

  async stepOnce() {
    await this.call('stepOnce');
    this.advance(1);
    if (this.state !== 'done') this.state = 'held';
  }

  async rewind() {
    await this.call('rewind');
    this.step = 0;
    this.state = 'ready';
  }

  async stop() {
    await this.call('stop');
    this.state = 'done';
    this.stopReason ??= 'stopped by the person';
  }

  async setPace(stepsPerSecond: number) {
    await this.call(`setPace ${stepsPerSecond}`);
  }

  async poll(request: { view: FieldView | null; sinceStep: number }) {
    this.looksAtOnce += 1;
    this.mostLooksAtOnce = Math.max(this.mostLooksAtOnce, this.looksAtOnce);
    this.views.push(request.view);
    await this.call('poll');
    this.looksAtOnce -= 1;
    if (this.state === 'running') this.advance(this.stride);
    const samples = (): Float32Array<ArrayBuffer> =>
      Float32Array.from({ length: this.step + 1 - request.sinceStep }, (_, n) => request.sinceStep + n);
    return {
      progress: this.progress(),
      frame:
        request.view === null
          ? null
          : {
              view: request.view,
              width: 1,
              height: 1,
              values: Float32Array.of(this.step),
              step: this.step,
              timeSeconds: 0,
              peak: 1,
            },
      traces: [{ probeId: 'probe-1', samples: [samples(), samples(), samples()] as const }],
      sinceStep: request.sinceStep,
    };
  }

  async record() {
    await this.call('record');
    return ok(makeRecord(this.role, this.step, this.stopReason ?? 'decayed'));
  }

  private advance(steps: number): void {
    this.step = Math.min(this.end, this.step + steps);
    if (this.step < this.end) return;
    this.state = 'done';
    this.stopReason = 'decayed';
  }

  private progress(): RunProgress {
    return {
      state: this.state,
      step: this.step,
      stepLimit: ESTIMATE.stepLimit,
      timeSeconds: this.step * ESTIMATE.dtSeconds,
      energyDb: -this.step,
      megaCellsPerSecond: 250,
      threads: 1,
      secondsLeft: 1,
      stopReason: this.stopReason,
      trouble: null,
    };
  }
}
