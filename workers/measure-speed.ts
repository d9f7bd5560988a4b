// Owns measuring the throughput of a machine: a standard sheet of a size, on so many threads, for so long.
// Must not know who asks, or where the session lives.
import { ok, type Result } from '../src/base/result.ts';
import { makeSpeedJob } from '../src/model/speed-job.ts';
import type { RunRecord, SessionApi } from './protocol.ts';
import { runToEnd } from './run-to-end.ts';

export interface SpeedCase {
  /** Cells along each side, absorbers included. */
  readonly cells: number;
  readonly threads: number;
}

export interface Speed extends SpeedCase {
  readonly cellsTotal: number;
  readonly steps: number;
  readonly wallSeconds: number;
  readonly megaCellsPerSecond: number;
}

/** Sizes that show what the caches and the absorbers do; each alone and with all threads. */
export function speedCases(threads: number): readonly SpeedCase[] {
  return [256, 512, 1024, 2048].flatMap((cells) => [...new Set([1, threads])].map((count) => ({ cells, threads: count })));
}

/** `threads` of the answer are those that worked. Returning true from `isOver` ends the measurement early. */
export async function measureSpeed(
  session: SessionApi,
  { cells, threads }: SpeedCase,
  seconds: number,
  isOver: () => boolean,
): Promise<Result<Speed>> {
  let began = Infinity;
  const run = await runToEnd(session, makeSpeedJob(cells), 'main', {
    threads,
    onProgress({ state }) {
      // The clock starts with the first report, when the plan has been made.
      began = Math.min(began, performance.now());
      return state === 'done' || (!isOver() && performance.now() - began < seconds * 1000);
    },
  });
  return run.ok ? ok(speedOf(cells, run.value)) : run;
}

function speedOf(cells: number, { threads, steps, wallSeconds, megaCellsPerSecond, estimate }: RunRecord): Speed {
  return { cells, threads, steps, wallSeconds, megaCellsPerSecond, cellsTotal: estimate.cellsTotal };
}
