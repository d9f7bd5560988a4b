// Owns `guidewall run`: the main run and its reference through one session, then the files.
// Must not know how fields are computed, nor what stands in the files.
import { mkdir, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { formatQuantity } from '../base/quantity.ts';
import type { Result } from '../base/result.ts';
import type { Job } from '../model/job.ts';
import { wantsReference } from '../model/reference.ts';
import { makeNodeSession } from '../../workers/session.node.ts';
import { runToEnd } from '../../workers/run-to-end.ts';
import type { RunRecord, RunRole } from '../../workers/protocol.ts';
import type { Threads } from './arguments.ts';
import { EXIT } from './exit-code.ts';
import type { ExitCode } from './exit-code.ts';
import { onInterrupt } from './interrupt.ts';
import { NO_PROGRESS, makeProgressLine, threadWords } from './progress-line.ts';
import { readJobFile, refuse } from './read-job-file.ts';
import { makeResultFiles } from './result-files.ts';
import { threadCount } from './thread-count.ts';

export async function runCommand(asked: {
  jobFile: string;
  directory: string;
  quiet: boolean;
  threads: Threads;
}): Promise<ExitCode> {
  const job = await readJobFile(asked.jobFile);
  if (!job.ok) return refuse(asked.jobFile, job.errors);
  // Before the run: an hour's work must not end at a folder that cannot be written.
  if (!(await canWrite(asked.directory))) return EXIT.failed;

  const interrupt = onInterrupt();
  const progress = asked.quiet ? NO_PROGRESS : makeProgressLine(process.stderr, () => performance.now());
  const session = makeNodeSession();
  const run = (role: RunRole): Promise<Result<RunRecord>> =>
    runToEnd(session, job.value, role, {
      threads: threadCount(asked.threads),
      onProgress(state) {
        progress.show(role, state);
        return state.state === 'done' || !interrupt.came;
      },
    });
  const main = await run('main');
  const goOn = wantsReference(job.value) && main.ok && main.value.trouble === null && !interrupt.came;
  const reference = goOn ? await run('reference') : null;
  progress.end();
  interrupt.release();

  if (!main.ok) return refuse(asked.jobFile, main.errors);
  if (reference !== null && !reference.ok) return refuse(asked.jobFile, reference.errors);
  return report(asked.directory, job.value, main.value, reference?.value ?? null, interrupt.came);
}

async function report(
  directory: string,
  job: Job,
  main: RunRecord,
  reference: RunRecord | null,
  interrupted: boolean,
): Promise<ExitCode> {
  const trouble = main.trouble ?? reference?.trouble ?? null;
  if (trouble !== null) {
    console.error(`The ${main.trouble === null ? 'reference run' : 'run'} failed: ${trouble} No files were written.`);
    return EXIT.failed;
  }
  const files = makeResultFiles(job, main, reference);
  try {
    for (const { name, text } of files) await writeFile(join(directory, name), text);
  } catch (error) {
    console.error(`The results cannot be written into ${directory} (${reasonOf(error)}).`);
    return EXIT.failed;
  }
  console.log(describeRun(main));
  if (reference !== null) console.log(describeRun(reference));
  console.log(files.map(({ name }) => join(directory, name)).join('\n'));
  if (interrupted) console.error('Stopped by Ctrl-C: the files hold what there was, and say so.');
  return interrupted ? EXIT.interrupted : EXIT.done;
}

function describeRun(run: RunRecord): string {
  const { role, stopReason, steps, dtSeconds, energyDb, wallSeconds, megaCellsPerSecond } = run;
  return (
    `${role}: ${stopReason} after ${steps} steps (${formatQuantity(steps * dtSeconds, 'time', 4)}), energy at ${energyDb.toFixed(1)} dB; ` +
    `${wallSeconds.toFixed(2)} s at ${megaCellsPerSecond.toFixed(0)} Mcell/s, ${threadWords(run.threads)}`
  );
}

async function canWrite(directory: string): Promise<boolean> {
  try {
    await mkdir(directory, { recursive: true });
    return true;
  } catch (error) {
    console.error(`--out ${directory}: the folder cannot be made (${reasonOf(error)}). Give another.`);
    return false;
  }
}

function reasonOf(error: unknown): string {
  return error instanceof Error ? error.message : String(error);
}
