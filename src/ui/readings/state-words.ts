// Owns what is said of the state of a reading: not run, running, edited since, without its reference.
// Must not know React.
import type { RunState } from '../../app/run-store.ts';
import type { Quantity } from './curve-data.ts';

type State = Pick<RunState, 'main' | 'reference' | 'referenceState' | 'stale' | 'progress'>;

export function describeState({ main, reference, referenceState, stale, progress }: State, quantity: Quantity): string {
  const running = progress.state === 'running';
  if (main === null) return running ? 'Running; the curve comes when the run has ended.' : 'Not run yet.';
  const edited = stale ? 'The job has been edited since: run again. ' : '';
  if (quantity === 'insertion ratio' && reference === null) {
    if (referenceState === 'running') return `${edited}The reference run is under way.`;
    if (referenceState === 'failed') return `${edited}The reference run failed: no ratio.`;
    return `${edited}The job has no reference run: there is nothing to divide by.`;
  }
  if (main.stopReason === 'time limit')
    return `${edited}Cut off at the time limit with the energy at ${main.energyDb.toFixed(0).replace('-', '−')} dB.`;
  if (main.stopReason === 'stopped by the person') return `${edited}Stopped by hand: the record is short.`;
  if (main.trouble !== null) return `${edited}Not to be trusted: ${main.trouble}`;
  return edited;
}
