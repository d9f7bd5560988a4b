// Owns `guidewall speed`: the throughput of this machine on a standard sheet.
// Must not know how the session steps.
import { describeError } from '../base/result.ts';
import { makeNodeSession } from '../../workers/session.node.ts';
import { runToEnd } from '../../workers/run-to-end.ts';
import type { Threads } from './arguments.ts';
import { EXIT } from './exit-code.ts';
import type { ExitCode } from './exit-code.ts';
import { onInterrupt } from './interrupt.ts';
import { duration, threadWords } from './progress-line.ts';
import { makeSpeedJob } from './speed-job.ts';
import { threadCount } from './thread-count.ts';

export async function speedCommand(asked: { cells: number; seconds: number; threads: Threads }): Promise<ExitCode> {
  const interrupt = onInterrupt();
  const { cells, seconds } = asked;
  const session = makeNodeSession();
  let began = Infinity;
  const run = await runToEnd(session, makeSpeedJob(cells), 'main', {
    threads: threadCount(asked.threads),
    onProgress({ state }) {
      // The clock starts with the first report, when the plan has been made.
      began = Math.min(began, performance.now());
      return state === 'done' || (!interrupt.came && performance.now() - began < seconds * 1000);
    },
  });
  interrupt.release();
  if (!run.ok) {
    for (const error of run.errors) console.error(describeError(error));
    return EXIT.failed;
  }
  const { steps, wallSeconds, megaCellsPerSecond, estimate } = run.value;
  const thousand = (1000 * estimate.cellsTotal) / (megaCellsPerSecond * 1e6);
  console.log(
    `${megaCellsPerSecond.toFixed(0)} Mcell/s (${estimate.cellsTotal} cells, ${steps} steps in ${wallSeconds.toFixed(2)} s, ${threadWords(run.value.threads)})\n` +
      `A thousand steps of this sheet take ${duration(thousand)}.`,
  );
  return interrupt.came ? EXIT.interrupted : EXIT.done;
}
