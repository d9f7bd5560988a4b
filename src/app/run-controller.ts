// Owns the run shown: opens the job in a solver, follows it, streams what comes out to the stores and the frame channel.
// Must not know React components, canvases, or how the solver works.
import type { RunProgress, SessionApi } from '../../workers/protocol.ts';
import { makeEstimate, type Estimate } from '../engine/estimate.ts';
import { NOMINAL_SPEED } from '../engine/plan.ts';
import type { Job, ResolvedJob } from '../model/job.ts';
import { componentsOf, fieldInSection } from './field-choice.ts';
import { frameLimits, latestFrame, publishFrame } from './frame-channel.ts';
import { GrowingTraces } from './growing-traces.ts';
import { useJobStore } from './job-store.ts';
import { Outlook } from './outlook.ts';
import { showKept, showReference } from './run-book.ts';
import { ReferenceRun } from './reference-run.ts';
import { asksTheSame, standsOnSameSheet } from './run-question.ts';
import { NO_PROGRESS, useRunStore } from './run-store.ts';
import { SolverSeat, type SpawnedSolver } from './solver-seat.ts';
import { untilDone } from './until-done.ts';
import { useViewStore } from './view-store.ts';

/** What the controller needs of its surroundings. */
export interface RunSurroundings {
  /** A solver whose runs may take up to `threads` threads. */
  spawn(threads: number): SpawnedSolver;
  /** The next moment at which something could be drawn. */
  nextFrame(): Promise<void>;
  wait(milliseconds: number): Promise<void>;
  /** Milliseconds from any start. */
  now(): number;
  /** Threads that may compute at once. */
  threads(): number;
}

/** What takes longer is run again only when asked for. */
const FOLLOW_SECONDS = 0.6;
/** An answer that takes longer than this is given up for that of a newer job. */
const PATIENCE_MILLISECONDS = 300;
const UNSEEN_LOOK_MILLISECONDS = 6;
/** Progress and samples reach the store at most ten times a second. */
const PUBLISH_MILLISECONDS = 100;

interface OpenRun {
  readonly job: Job;
  readonly resolved: ResolvedJob;
  readonly estimate: Estimate;
}

/** Also the actions, but for those of the run book that need no solver. */
export class RunController {
  private readonly around: RunSurroundings;
  private readonly seat: SolverSeat;
  private readonly reference: ReferenceRun;
  private readonly outlook: Outlook;
  private open: OpenRun | null = null;
  private growing = new GrowingTraces();
  private pace = Infinity;
  /** Measured on this machine by the last run, million cells a second. */
  private speed = NOMINAL_SPEED;
  /** Whoever follows an older turn sees that it has passed, and ends. */
  private turn = 0;
  private publishedAt = -Infinity;
  private poll: Promise<unknown> | null = null;
  /** Solvers given up so far: a call to one of them may fail without being news. */
  private givenUp = 0;
  private following = false;
  /** The run that is open shows nothing of itself until its answer is there. */
  private unseen = false;

  constructor(around: RunSurroundings) {
    this.around = around;
    this.outlook = new Outlook(() => around.nextFrame());
    this.seat = new SolverSeat(() => around.spawn(around.threads()));
    const wait = (milliseconds: number): Promise<void> => around.wait(milliseconds);
    const seat = new SolverSeat(() => around.spawn(eachOfTwo(around.threads())));
    this.reference = new ReferenceRun(
      seat,
      () => eachOfTwo(around.threads()),
      wait,
      () => this.publishReference(),
    );
  }

  /** Follows the job and the view from now on. The answer ends it and gives the solvers up. */
  attach(): () => void {
    const endJob = useJobStore.subscribe((state, before) => {
      if (state.job === before.job) return;
      this.outlook.tell([]);
      this.jobChanged();
    });
    const endView = useViewStore.subscribe((state, before) => {
      if (state.follows && !before.follows) void this.followEdits();
      if (state.field !== before.field || state.fieldPlace !== before.fieldPlace) void this.refresh();
    });
    this.jobChanged();
    return () => {
      endJob();
      endView();
      this.giveUp();
    };
  }

  run(): Promise<void> {
    return this.guarded(async () => {
      const turn = await this.openJob();
      if (turn !== null) await this.go(turn);
    });
  }

  hold(): Promise<void> {
    return this.guarded(async () => {
      if (this.open === null) return;
      await Promise.all([this.seat.api.hold(), this.reference.hold()]);
      await this.look();
    });
  }

  resume(): Promise<void> {
    return this.guarded(async () => {
      const { state } = useRunStore.getState().progress;
      const turn = this.open === null || state === 'done' ? await this.openJob() : ++this.turn;
      if (turn !== null) await this.go(turn);
    });
  }

  stepOnce(): Promise<void> {
    return this.guarded(async () => {
      const { progress, stale } = useRunStore.getState();
      const fresh = this.open === null || progress.state === 'done' || (stale && progress.state === 'ready');
      const turn = fresh ? await this.openJob() : ++this.turn;
      if (turn === null) return;
      await this.seat.api.hold();
      await this.seat.api.stepOnce();
      const progressNow = await this.look();
      if (progressNow?.state === 'done') await this.finish(turn);
    });
  }

  backToStart(): Promise<void> {
    return this.guarded(async () => {
      const open = this.open;
      if (open === null || !asksTheSame(open.job, useJobStore.getState().job)) await this.openJob();
      else {
        this.turn += 1;
        await this.seat.api.rewind();
        this.growing = new GrowingTraces();
      }
      await this.look();
    });
  }

  stop(): Promise<void> {
    return this.guarded(async () => {
      if (this.open === null) return;
      const turn = ++this.turn;
      await Promise.all([this.seat.api.stop(), this.reference.stop()]);
      await this.look();
      await this.finish(turn);
    });
  }

  setPace(stepsPerSecond: number): Promise<void> {
    this.pace = stepsPerSecond;
    return this.guarded(async () => {
      if (this.open !== null) await this.seat.api.setPace(stepsPerSecond);
    });
  }

  /** The solver for other work; null while a run needs it. The next run opens its job anew. */
  lendSolver(): SessionApi | null {
    const { state } = useRunStore.getState().progress;
    if (state === 'running' || state === 'held') return null;
    this.turn += 1;
    this.open = null;
    return this.seat.api;
  }

  reopenKept(id: string): void {
    const run = useRunStore.getState().kept.find((kept) => kept.id === id);
    if (run === undefined) return;
    const replaced = useJobStore.getState().dispatch({ do: 'replace', job: run.job });
    if (!replaced.ok) return this.outlook.tell(replaced.errors);
    this.giveUp();
    publishFrame(null);
    showKept(run);
  }

  /** Opens the job as it stands, at t = 0. Null when it cannot be run or another run has taken over. */
  private async openJob(unseen = false): Promise<number | null> {
    const turn = ++this.turn;
    this.unseen = unseen;
    const { job, resolved } = useJobStore.getState();
    this.outlook.tell([]);
    if (!resolved.ok) return null;
    const estimate = makeEstimate(resolved.value, this.speed);
    if (!estimate.ok) {
      this.open = null;
      this.outlook.tell(estimate.errors);
      return null;
    }
    const alone = !this.reference.isNeeded(job, resolved.value, estimate.value);
    const threads = this.around.threads();
    const opened = await this.seat.api.open(job, 'main', alone ? threads : eachOfTwo(threads));
    if (turn !== this.turn) return null;
    if (!opened.ok) {
      this.open = null;
      this.outlook.tell(opened.errors);
      return null;
    }
    await this.seat.api.setPace(unseen ? Infinity : this.pace);
    if (turn !== this.turn) return null;
    this.open = { job, resolved: resolved.value, estimate: estimate.value };
    this.growing = new GrowingTraces();
    if (unseen) return turn;
    useRunStore.setState({
      progress: { ...NO_PROGRESS, stepLimit: opened.value.stepLimit },
      components: componentsOf(job.section),
      liveTraces: [],
      liveCount: 0,
      stale: !asksTheSame(job, useJobStore.getState().job),
    });
    return turn;
  }

  /** Steps on and follows until the run ends or another turn begins. */
  private async go(turn: number): Promise<void> {
    const open = this.open;
    if (open === null) return;
    await this.seat.api.start();
    void this.reference.follow(open.job, open.resolved, open.estimate);
    void this.reference.resume();
    await this.follow(turn);
  }

  private async follow(turn: number): Promise<void> {
    while (turn === this.turn) {
      const progress = await this.look();
      if (turn !== this.turn) return;
      if (progress?.state === 'done') return this.finish(turn);
      if (progress !== null && progress.state !== 'running') return;
      await this.around.nextFrame();
    }
  }

  /** Solves a small job again when it has been edited, and again while it goes on being: the curve follows the hand. */
  private async followEdits(): Promise<void> {
    if (this.following) return;
    this.following = true;
    await this.around.nextFrame();
    await this.guarded(async () => {
      while (this.mayFollow()) {
        const turn = await this.openJob(true);
        if (turn === null || !(await this.solveUnseen(turn))) break;
      }
    });
    this.following = false;
  }

  /** Only behind a finished run: one that is watched, held or stopped by hand is the person's. */
  private mayFollow(): boolean {
    const { stale, progress, main } = useRunStore.getState();
    const { resolved } = useJobStore.getState();
    if (!useViewStore.getState().follows || !stale || progress.state !== 'done' || !resolved.ok) return false;
    if (main === null || main.stopReason === 'stopped by the person') return false;
    const estimate = makeEstimate(resolved.value, this.speed);
    return estimate.ok && estimate.value.cellsTotal * main.steps < FOLLOW_SECONDS * this.speed * 1e6;
  }

  /** False when the run was taken over or broke. */
  private async solveUnseen(turn: number): Promise<boolean> {
    const { open, around, seat } = this;
    if (open === null) return false;
    await seat.api.start();
    const referenced = this.reference.follow(open.job, open.resolved, open.estimate);
    const began = around.now();
    const isOutdated = (): boolean =>
      around.now() - began > PATIENCE_MILLISECONDS && !asksTheSame(open.job, useJobStore.getState().job);
    const isGivenUp = ({ state }: RunProgress): boolean => turn !== this.turn || state === 'held' || isOutdated();
    const ended = await untilDone(seat.api, () => around.wait(UNSEEN_LOOK_MILLISECONDS), isGivenUp);
    if (!ended) return turn === this.turn && isOutdated();
    await referenced;
    if (turn !== this.turn) return false;
    this.unseen = false;
    useRunStore.setState({ components: componentsOf(open.job.section) });
    await this.look();
    await this.finish(turn);
    return true;
  }

  /** One poll, after the one under way: there are never two. Null when nothing is open any more. */
  private async look(): Promise<RunProgress | null> {
    while (this.poll !== null) await this.poll.catch(() => undefined);
    const { open, growing } = this;
    if (open === null || this.unseen) return null;
    const { field, fieldPlace } = useViewStore.getState();
    const { width, height } = frameLimits();
    const view = fieldPlace === 'off' ? null : fieldInSection(field, open.job.section);
    const poll = this.seat.api.poll({ view, maxWidth: width, maxHeight: height, sinceStep: growing.count });
    this.poll = poll;
    const report = await poll.finally(() => (this.poll = null));
    // Rewound or replaced meanwhile: what came belongs to no one.
    if (this.growing !== growing || this.open !== open) return null;
    growing.append(report);
    if (report.frame !== null && this.fitsSheet(open)) publishFrame(report.frame);
    this.publish(report.progress);
    return report.progress;
  }

  /** The view has changed: shows it at once, also while the run stands still. */
  private async refresh(): Promise<void> {
    if (useViewStore.getState().fieldPlace === 'off') publishFrame(null);
    await this.guarded(async () => void (await this.look()));
  }

  private async finish(turn: number): Promise<void> {
    const open = this.open;
    const record = await this.seat.api.record();
    if (turn !== this.turn || open === null) return;
    if (!record.ok) return this.outlook.tell(record.errors);
    if (record.value.megaCellsPerSecond > 0) this.speed = record.value.megaCellsPerSecond;
    const { state, record: reference } = this.reference;
    useRunStore.setState({ main: record.value, answeredJob: open.job, reference, referenceState: state });
    if (record.value.stopReason === 'broken') this.seat.clear();
    this.jobChanged();
  }

  private publish(progress: RunProgress): void {
    const now = this.around.now();
    const settled = progress.state !== 'running' || useRunStore.getState().progress.state !== 'running';
    if (!settled && now - this.publishedAt < PUBLISH_MILLISECONDS) return;
    this.publishedAt = now;
    useRunStore.setState({ progress, liveTraces: this.growing.traces, liveCount: this.growing.count });
  }

  /** The reference belongs with the record it divides: it waits until that is there. */
  private publishReference(): void {
    const { state, record, errors } = this.reference;
    if (this.unseen && state !== 'failed') return;
    const answered = useRunStore.getState().answeredJob === this.open?.job;
    useRunStore.setState({ referenceState: state });
    if (answered && state === 'done') showReference(record);
    if (state === 'failed') this.outlook.tell(errors);
  }

  private jobChanged(): void {
    const { job } = useJobStore.getState();
    const asked = this.open?.job ?? useRunStore.getState().answeredJob;
    const stale = asked !== null && !asksTheSame(asked, job);
    if (stale !== useRunStore.getState().stale) useRunStore.setState({ stale });
    const { field, setField } = useViewStore.getState();
    const fitting = fieldInSection(field, job.section);
    if (fitting !== field) setField(fitting);
    this.fitFrame();
    void this.outlook.estimateSoon(() => this.speed);
    if (stale) void this.followEdits();
  }

  /** A field computed on another sheet would be drawn at false places. */
  private fitsSheet(open: OpenRun): boolean {
    const { resolved } = useJobStore.getState();
    return !resolved.ok || standsOnSameSheet(open.resolved, resolved.value);
  }

  private fitFrame(): void {
    if (this.open === null) return;
    const fits = this.fitsSheet(this.open);
    if (!fits && latestFrame() !== null) publishFrame(null);
    if (fits && latestFrame() === null) void this.refresh();
  }

  /** The solver may die at any call: that is told, and nothing else is lost. */
  private async guarded(work: () => Promise<void>): Promise<void> {
    const givenUp = this.givenUp;
    try {
      await work();
    } catch (error) {
      if (givenUp !== this.givenUp) return;
      this.giveUp();
      useRunStore.setState((state) => ({ progress: { ...state.progress, state: 'ready', secondsLeft: 0 } }));
      this.outlook.tell([
        {
          code: 'solver',
          message: error instanceof Error ? error.message : String(error),
          hint: 'The job and the readings so far are kept. Run again; take fewer cells if it happens again.',
        },
      ]);
    }
  }

  private giveUp(): void {
    this.givenUp += 1;
    this.turn += 1;
    this.open = null;
    this.growing = new GrowingTraces();
    this.seat.clear();
    this.reference.forget();
  }
}

function eachOfTwo(threads: number): number {
  return Math.max(1, Math.floor(threads / 2));
}
