// Owns `guidewall speed`: the throughput of this machine on standard sheets, as a table.
// Must not know how it is measured.
import { describeError } from '../base/result.ts';
import { measureSpeed, speedCases, type Speed } from '../../workers/measure-speed.ts';
import { makeNodeSession } from '../../workers/session.node.ts';
import type { Threads } from './arguments.ts';
import { EXIT } from './exit-code.ts';
import type { ExitCode } from './exit-code.ts';
import { onInterrupt } from './interrupt.ts';
import { duration, threadWords } from './progress-line.ts';
import { threadCount } from './thread-count.ts';

/** `cells` null: several sizes, each on one thread and on all that are offered. */
export async function speedCommand(asked: { cells: number | null; seconds: number; threads: Threads }): Promise<ExitCode> {
  const interrupt = onInterrupt();
  const session = makeNodeSession();
  const threads = threadCount(asked.threads);
  const cases = asked.cells === null ? speedCases(threads) : [{ cells: asked.cells, threads }];
  let trouble = false;
  for (const one of cases) {
    if (interrupt.came) break;
    const speed = await measureSpeed(session, one, asked.seconds, () => interrupt.came);
    if (speed.ok) console.log(describeSpeed(speed.value));
    else for (const error of speed.errors) console.error(describeError(error));
    trouble ||= !speed.ok;
  }
  interrupt.release();
  return trouble ? EXIT.failed : interrupt.came ? EXIT.interrupted : EXIT.done;
}

function describeSpeed({ cells, cellsTotal, threads, steps, wallSeconds, megaCellsPerSecond }: Speed): string {
  const thousand = (1000 * cellsTotal) / (megaCellsPerSecond * 1e6);
  return (
    `${`${cells} x ${cells}`.padEnd(11)} ${threadWords(threads).padEnd(10)} ${megaCellsPerSecond.toFixed(0).padStart(6)} Mcell/s` +
    `   a thousand steps take ${duration(thousand)}   (${steps} steps in ${wallSeconds.toFixed(2)} s)`
  );
}
