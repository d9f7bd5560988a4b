// Owns waiting for a run to end, for callers that want nothing of it before.
// Must not know what the run is for.
import type { RunProgress, SessionApi } from '../../workers/protocol.ts';

/** Looks at the run under way, waits by `wait`, and looks again. False when the caller gave it up before its end. */
export async function untilDone(
  api: SessionApi,
  wait: () => Promise<void>,
  isGivenUp: (progress: RunProgress) => boolean,
): Promise<boolean> {
  for (;;) {
    const { progress } = await api.poll({ view: null, maxWidth: 0, maxHeight: 0, sinceStep: Infinity });
    if (isGivenUp(progress)) return false;
    if (progress.state === 'done') return true;
    await wait();
  }
}
