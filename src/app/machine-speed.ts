// Owns measuring this machine from the page, in the solver of the run while that stands still.
// Must not know React components.
import { measureSpeed, speedCases, type Speed } from '../../workers/measure-speed.ts';
import { describeError } from '../base/result.ts';
import { runController, threadsOfMachine } from './run-actions.ts';

const SECONDS_EACH = 0.5;

/** Calls `tell` with each speed as it is known. The answer is in words: what there is to say at the end. */
export async function measureMachine(tell: (speed: Speed) => void, signal: AbortSignal): Promise<string> {
  const threads = threadsOfMachine();
  const api = runController.lendSolver();
  if (api === null) return 'A run is under way or held: measure when it has ended.';
  try {
    for (const one of speedCases(threads)) {
      if (signal.aborted) break;
      const speed = await measureSpeed(api, one, SECONDS_EACH, () => signal.aborted);
      if (!speed.ok) return describeError(speed.errors[0]);
      tell(speed.value);
    }
  } catch (error) {
    return error instanceof Error ? error.message : String(error);
  }
  if (globalThis.crossOriginIsolated || threads === 1)
    return 'Measured. Run times in the Brief are estimated from the runs themselves.';
  return 'Measured. This page is not isolated from other origins, so memory cannot be shared: a run has one thread.';
}
