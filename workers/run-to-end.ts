// Owns running a job from start to record through a session, for callers that only want the result.
// Must not know where the session lives.
import type { Result } from '../src/base/result.ts';
import type { Job } from '../src/model/job.ts';
import type { RunProgress, RunRecord, RunRole, SessionApi } from './protocol.ts';

const POLL_MILLISECONDS = 25;

/** Opens, runs and reads a job. `onProgress` is called about 40 times a second; returning false stops the run. */
export async function runToEnd(
  session: SessionApi,
  job: Job,
  role: RunRole,
  onProgress?: (progress: RunProgress) => boolean | void,
): Promise<Result<RunRecord>> {
  const opened = await session.open(job, role);
  if (!opened.ok) return opened;
  await session.start();
  for (;;) {
    const { progress } = await session.poll({ view: null, maxWidth: 0, maxHeight: 0, sinceStep: Number.MAX_SAFE_INTEGER });
    const goOn = onProgress?.(progress) !== false;
    if (progress.state === 'done') break;
    if (!goOn) await session.stop();
    else await new Promise((resolve) => setTimeout(resolve, POLL_MILLISECONDS));
  }
  return session.record();
}
