// Owns the life of a run: open, start, hold, step, stop, and what streams out meanwhile. Platform-free.
// Must not know whether it lives in a Web Worker or in this process; the host gives kernel, clock and turn-taking.
import { fail, ok, type Result } from '../src/base/result.ts';
import type { Estimate } from '../src/engine/estimate.ts';
import { BLOCK_STEPS } from '../src/engine/feasible.ts';
import { sampleField, type FrameQuantity } from '../src/engine/frame.ts';
import { makePlan } from '../src/engine/plan.ts';
import type { Job } from '../src/model/job.ts';
import { resolveJob } from '../src/model/resolve-job.ts';
import type {
  FieldFrame,
  FieldView,
  ProbeTrace,
  RunProgress,
  RunRecord,
  RunRole,
  SessionApi,
  SessionReport,
  StopReason,
} from './protocol.ts';
import { openRun, type Run } from './run.ts';
import type { ThreadPool } from './thread-pool.ts';

export interface SessionHost {
  /** The compiled kernel, or its build for shared memory; each asked for once. */
  loadKernel(shared: boolean): Promise<WebAssembly.Module>;
  /** Helper threads, or null where memory cannot be shared. */
  readonly pool: ThreadPool | null;
  /** Lets waiting messages in; resolves after at least `milliseconds`. */
  yieldTurn(milliseconds: number): Promise<void>;
  /** Milliseconds from any start. */
  now(): number;
}

/** Time between looks at the messages. */
const SLICE_MILLISECONDS = 8;
/** A block may take this many times as long as half a slice. */
const MOST_SLICES = 25;
/** The energy is looked at when the step is a multiple of this, however the run was sliced: so a job always ends at the same step. */
const ENERGY_EVERY = 256;
/** Energy may not rise again after the drives have ended; this much above its lowest is no ripple. */
const GROWTH_FACTOR = 4;
/** Below this a static field of charged metal may trade slowly with the absorber; a runaway passes it soon. */
const RUNAWAY_DB = -30;

export function makeSession(host: SessionHost): SessionApi {
  const session = new Session(host);
  return {
    prepare: (threads) => session.prepare(threads),
    open: (job, role, threads) => session.open(job, role, threads),
    start: () => session.start(),
    hold: () => session.hold(),
    stepOnce: () => session.stepOnce(),
    rewind: () => session.rewind(),
    stop: () => session.stop(),
    setPace: (stepsPerSecond) => session.setPace(stepsPerSecond),
    poll: (request) => session.poll(request),
    record: () => session.record(),
  };
}

class Session implements SessionApi {
  private readonly host: SessionHost;
  private readonly kernels = new Map<boolean, Promise<WebAssembly.Module>>();
  private run: Run | null = null;
  private role: RunRole = 'main';
  private state: RunProgress['state'] = 'ready';
  private stopReason: StopReason | null = null;
  private trouble: string | null = null;
  private energyPeak = 0;
  private energyDb = 0;
  /** Lowest energy since the drives ended. */
  private energyLowest = Infinity;
  private pace = Infinity;
  private busyMilliseconds = 0;
  private speed = 0;
  /** Loops started for an earlier run see that their number has passed and end. */
  private generation = 0;

  constructor(host: SessionHost) {
    this.host = host;
  }

  async prepare(threads: number): Promise<void> {
    await this.kernelFor(false);
    if (this.host.pool === null || threads < 2) return;
    this.host.pool.prepare(threads - 1);
    await this.kernelFor(true);
  }

  async open(job: Job, role: RunRole, threads = 1): Promise<Result<Estimate>> {
    this.generation++;
    this.run?.close();
    this.run = null;
    const resolved = resolveJob(job);
    if (!resolved.ok) return resolved;
    const plan = makePlan(resolved.value, role, this.host.pool === null ? 1 : threads);
    if (!plan.ok) return plan;
    const run = openRun(plan.value, await this.kernelFor(plan.value.threads > 1), this.host.pool);
    if (!run.ok) return run;
    this.run = run.value;
    this.role = role;
    this.reset();
    return ok(plan.value.estimate);
  }

  async start(): Promise<void> {
    if (this.run === null || this.state === 'running' || this.state === 'done') return;
    this.state = 'running';
    void this.guardedLoop(this.run, ++this.generation);
  }

  async hold(): Promise<void> {
    if (this.state === 'running') this.state = 'held';
    this.generation++;
  }

  async stepOnce(): Promise<void> {
    if (this.run === null || this.state === 'running' || this.state === 'done') return;
    this.run.advance(1);
    this.state = 'held';
    this.judge(this.run);
  }

  async rewind(): Promise<void> {
    if (this.run === null) return;
    this.generation++;
    this.run.rewind();
    this.reset();
  }

  async stop(): Promise<void> {
    if (this.run === null || this.state === 'done') return;
    this.generation++;
    this.finish('stopped by the person');
  }

  async setPace(stepsPerSecond: number): Promise<void> {
    this.pace = stepsPerSecond > 0 ? stepsPerSecond : Infinity;
  }

  async poll(request: Parameters<SessionApi['poll']>[0]): Promise<SessionReport> {
    const { run } = this;
    if (run === null) return { progress: this.progress(), frame: null, traces: [], sinceStep: request.sinceStep };
    // A rewound run has fewer samples than the caller holds: it starts again from none. Infinity asks for no samples.
    const { sinceStep: since } = request;
    const sinceStep = Number.isFinite(since) && since > run.step + 1 ? 0 : Math.max(0, since);
    return {
      progress: this.progress(),
      frame: request.view === null ? null : makeFrame(run, request.view, request.maxWidth, request.maxHeight),
      traces: tracesOf(run, sinceStep),
      sinceStep,
    };
  }

  async record(): Promise<Result<RunRecord>> {
    const { run } = this;
    if (run === null) return fail({ code: 'nothing open', message: 'No run is open.', hint: 'Open a job first.' });
    const { plan } = run;
    return ok({
      role: this.role,
      planHash: plan.hash,
      components: plan.section === 'E out of plane' ? (['Ez', 'Hx', 'Hy'] as const) : (['Hz', 'Ex', 'Ey'] as const),
      dtSeconds: plan.dtSeconds,
      steps: run.step,
      stopReason: this.stopReason ?? 'stopped by the person',
      trouble: this.trouble,
      energyDb: this.energyDb,
      wallSeconds: this.busyMilliseconds / 1000,
      threads: run.threads,
      megaCellsPerSecond: this.meanSpeed(run),
      estimate: plan.estimate,
      frequenciesHertz: plan.frequenciesHertz,
      traces: tracesOf(run, 0),
      spectra: plan.probeIds.map((probeId, p) => ({
        probeId,
        components: [0, 1, 2].map((component) => run.spectrum(3 * p + component)),
      })),
      driveSpectrum: run.driveSpectrum(),
    });
  }

  private kernelFor(shared: boolean): Promise<WebAssembly.Module> {
    const known = this.kernels.get(shared);
    if (known !== undefined) return known;
    const kernel = this.host.loadKernel(shared);
    this.kernels.set(shared, kernel);
    return kernel;
  }

  private reset(): void {
    this.state = 'ready';
    this.stopReason = null;
    this.trouble = null;
    this.energyPeak = 0;
    this.energyDb = 0;
    this.energyLowest = Infinity;
    this.busyMilliseconds = 0;
    this.speed = 0;
  }

  private finish(reason: StopReason): void {
    this.stopReason = reason;
    this.state = 'done';
  }

  /** Nobody waits for the loop: what breaks it is told by the progress. */
  private async guardedLoop(run: Run, generation: number): Promise<void> {
    try {
      await this.loop(run, generation);
    } catch (error) {
      if (generation !== this.generation) return;
      const reason = error instanceof Error ? error.message : String(error);
      this.trouble = `The solver broke at step ${run.step} (${reason}). Run again; take fewer threads or cells if it happens again.`;
      this.finish('broken');
    }
  }

  /** Steps in slices until the run ends or another command takes over. */
  private async loop(run: Run, generation: number): Promise<void> {
    let chunk = 16;
    const began = { at: this.host.now(), step: run.step };
    while (this.state === 'running' && this.generation === generation) {
      const sliceStart = this.host.now();
      const firstStep = run.step;
      const allowed = Math.ceil(((sliceStart - began.at) / 1000) * this.pace) + 1 - (run.step - began.step);
      const paced = Number.isFinite(this.pace);
      let elapsed = 0;
      while (this.state === 'running' && elapsed < SLICE_MILLISECONDS) {
        const untilLook = ENERGY_EVERY - (run.step % ENERGY_EVERY);
        const steps = Math.min(
          chunk,
          untilLook,
          run.plan.stepLimit - run.step,
          paced ? allowed - (run.step - firstStep) : Infinity,
        );
        if (steps <= 0) break;
        run.advance(steps);
        this.judge(run);
        elapsed = this.host.now() - sliceStart;
      }
      const steps = run.step - firstStep;
      this.busyMilliseconds += elapsed;
      if (elapsed > 0 && steps > 0) {
        const now = (steps * run.plan.estimate.cellsTotal) / (elapsed * 1000);
        this.speed = this.speed === 0 ? now : 0.8 * this.speed + 0.2 * now;
        chunk = chunkOf(run, (steps * SLICE_MILLISECONDS) / Math.max(elapsed, 0.5) / 2);
      }
      await this.host.yieldTurn(paced && steps <= 1 ? Math.min(50, 1000 / this.pace) : 0);
    }
  }

  /** Ends the run when it has decayed, reached its limit or broken. */
  private judge(run: Run): void {
    const { plan } = run;
    const atLimit = run.step >= plan.stepLimit;
    if (atLimit || run.step % ENERGY_EVERY === 0) {
      const energy = run.energy();
      if (!Number.isFinite(energy)) {
        this.trouble = describeTrouble(run);
        this.finish('not finite');
        return;
      }
      this.energyPeak = Math.max(this.energyPeak, energy);
      this.energyDb = this.energyPeak > 0 ? 10 * Math.log10(Math.max(energy, 1e-300) / this.energyPeak) : 0;
      const driven = run.step * plan.dtSeconds >= plan.drivenSeconds;
      if (driven && this.energyPeak > 0 && this.energyDb <= -plan.decayDb) {
        this.finish('decayed');
        return;
      }
      if (driven) {
        this.energyLowest = Math.min(this.energyLowest, energy);
        if (energy > GROWTH_FACTOR * this.energyLowest && this.energyDb > RUNAWAY_DB) {
          this.trouble = `The energy rises again after the drives have ended (step ${run.step}): an absorbing edge feeds a resonance that stands close to it. Move the structure away from the edge, or make the absorbing edge deeper.`;
          this.finish('growing');
          return;
        }
      }
    }
    if (atLimit) this.finish('time limit');
  }

  private meanSpeed(run: Run): number {
    return this.busyMilliseconds > 0 ? (run.step * run.plan.estimate.cellsTotal) / (this.busyMilliseconds * 1000) : 0;
  }

  private progress(): RunProgress {
    const { run } = this;
    const stepLimit = run?.plan.stepLimit ?? 0;
    const step = run?.step ?? 0;
    const perSecond = run === null || this.speed === 0 ? 0 : (this.speed * 1e6) / run.plan.estimate.cellsTotal;
    return {
      state: this.state,
      step,
      stepLimit,
      timeSeconds: step * (run?.plan.dtSeconds ?? 0),
      energyDb: this.energyDb,
      megaCellsPerSecond: this.speed,
      threads: run?.threads ?? 1,
      secondsLeft: perSecond > 0 && this.state !== 'done' ? (stepLimit - step) / Math.min(perSecond, this.pace) : 0,
      stopReason: this.stopReason,
      trouble: this.trouble,
    };
  }
}

/**
 * About `steps`, in whole blocks for every thread, for a row is cheaper the more steps pass it at once; single steps only where
 * a block would keep messages waiting many slices long.
 */
function chunkOf(run: Run, steps: number): number {
  const whole = BLOCK_STEPS * run.threads;
  const chunk = whole > MOST_SLICES * steps ? Math.max(1, Math.round(steps)) : whole * Math.max(1, Math.round(steps / whole));
  return Math.min(run.plan.slice, chunk);
}

function describeTrouble(run: Run): string {
  const place = run.firstNotFinite();
  const { fields } = run.plan;
  const where =
    place === null
      ? 'somewhere on the sheet'
      : `at ${((place.i - fields.firstColumn) * fields.dxMetres * 1e3).toPrecision(4)} mm, ${((place.j - fields.firstRow) * fields.dyMetres * 1e3).toPrecision(4)} mm from the lower left corner`;
  return `The field is no longer a finite number at step ${run.step}, ${where}. A drive of enormous amplitude, or samples that are not finite, are the likely cause.`;
}

function tracesOf(run: Run, sinceStep: number): ProbeTrace[] {
  return run.plan.probeIds.map((probeId, p) => ({
    probeId,
    samples: [run.traceFrom(3 * p, sinceStep), run.traceFrom(3 * p + 1, sinceStep), run.traceFrom(3 * p + 2, sinceStep)] as const,
  }));
}

function quantityOf(view: FieldView, section: 'E out of plane' | 'H out of plane'): FrameQuantity {
  if (view === '|E|') return section === 'E out of plane' ? 'u magnitude' : 'in-plane magnitude';
  if (view === '|H|') return section === 'E out of plane' ? 'in-plane magnitude' : 'u magnitude';
  return view.endsWith('x') ? 'x' : view.endsWith('y') ? 'y' : 'u';
}

function makeFrame(run: Run, view: FieldView, maxWidth: number, maxHeight: number): FieldFrame {
  const { plan } = run;
  const sampled = sampleField(
    run.image,
    plan.fields,
    plan.section,
    quantityOf(view, plan.section),
    maxWidth,
    maxHeight,
    run.rows,
  );
  return { view, ...sampled, step: run.step, timeSeconds: run.step * plan.dtSeconds };
}
