// Owns how a run's progress looks: a bar that redraws itself on a terminal, plain lines elsewhere.
// Must not know the session.
import type { RunProgress, RunRole } from '../../workers/protocol.ts';

/** Where progress is written: the error stream, or a recorder in tests. */
export interface ProgressStream {
  readonly isTTY?: boolean;
  write(text: string): unknown;
}

export interface ProgressLine {
  show(role: RunRole, progress: RunProgress): void;
  /** Leaves the terminal on a fresh line. */
  end(): void;
}

const BAR_CELLS = 24;
// Often enough to look alive, seldom enough not to slow a terminal over a network.
const REDRAW_MILLISECONDS = 100;
const PLAIN_LINE_MILLISECONDS = 2000;

export const NO_PROGRESS: ProgressLine = { show: () => undefined, end: () => undefined };

export function makeProgressLine(stream: ProgressStream, now: () => number): ProgressLine {
  const redraws = stream.isTTY === true;
  const pause = redraws ? REDRAW_MILLISECONDS : PLAIN_LINE_MILLISECONDS;
  let last = -Infinity;
  let lastRole: RunRole | null = null;
  return {
    show(role, progress) {
      const due = now() - last >= pause || progress.state === 'done' || role !== lastRole;
      if (!due) return;
      last = now();
      if (redraws && lastRole !== null && lastRole !== role) stream.write('\n');
      lastRole = role;
      stream.write(
        redraws ? `\r${describeProgress(role, progress, true)}\x1b[K` : `${describeProgress(role, progress, false)}\n`,
      );
    },
    end() {
      if (redraws && lastRole !== null) stream.write('\n');
      lastRole = null;
    },
  };
}

/** One line: the run, how far it is, energy left, throughput, time left. */
export function describeProgress(role: RunRole, progress: RunProgress, withBar: boolean): string {
  const done = progress.state === 'done';
  const fraction = progress.stepLimit === 0 ? 1 : progress.step / progress.stepLimit;
  const filled = Math.round(Math.min(1, done ? 1 : fraction) * BAR_CELLS);
  const bar = withBar ? ` [${'#'.repeat(filled)}${'.'.repeat(BAR_CELLS - filled)}]` : '';
  const end = done ? (progress.stopReason ?? 'done') : `${duration(progress.secondsLeft)} left at most`;
  return (
    `${role.padEnd(9)}${bar} step ${progress.step} of ${progress.stepLimit}, energy ${decibels(progress.energyDb)}, ` +
    `${progress.megaCellsPerSecond.toFixed(0)} Mcell/s, ${end}`
  );
}

function decibels(value: number): string {
  return Number.isFinite(value) ? `${value.toFixed(1)} dB` : 'none yet';
}

/** "0.4 s", "12 s", "3 min 20 s", "2 h 5 min". */
export function duration(seconds: number): string {
  if (!Number.isFinite(seconds)) return 'unknown time';
  if (seconds < 10) return `${seconds.toFixed(1)} s`;
  const whole = Math.round(seconds);
  if (whole < 60) return `${whole} s`;
  if (whole < 3600) return `${Math.floor(whole / 60)} min ${whole % 60} s`;
  return `${Math.floor(whole / 3600)} h ${Math.floor((whole % 3600) / 60)} min`;
}

export function threadWords(threads: number): string {
  return threads === 1 ? 'one thread' : `${threads} threads`;
}
