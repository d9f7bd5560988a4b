// Owns running a job from start to record through a session, for callers that only want the result.
// Must not know where the session lives.
import type { Result } from '../src/base/result.ts';
import type { Job } from '../src/model/job.ts';
import type { RunProgress, RunRecord, RunRole, SessionApi } from './protocol.ts';

const POLL_MILLISECONDS = 25;

export interface RunWishes {
  /** Called about 40 times a second; returning false stops the run. */
  onProgress?(progress: RunProgress): boolean | void;
  /** How many threads may work on the run; 1 when left out. */
  readonly threads?: number;
}

/** Opens, runs and reads a job. */
export async function runToEnd(
  session: SessionApi,
  job: Job,
  role: RunRole,
  { onProgress, threads = 1 }: RunWishes = {},
): Promise<Result<RunRecord>> {
  const opened = await session.open(job, role, threads);
  if (!opened.ok) return opened;
  await session.start();
  for (;;) {
    const { progress } = await session.poll({ view: null, maxWidth: 0, maxHeight: 0, sinceStep: Infinity });
    const goOn = onProgress?.(progress) !== false;
    if (progress.state === 'done') break;
    if (!goOn) await session.stop();
    else await new Promise((resolve) => setTimeout(resolve, POLL_MILLISECONDS));
  }
  return session.record();
}
