// Owns what is said of the state of a reading: not run, running, edited since, without its reference.
// Must not know React.
import type { RunState } from '../../app/run-store.ts';
import type { Quantity } from './curve-data.ts';

type State = Pick<RunState, 'main' | 'reference' | 'referenceState' | 'stale' | 'progress'>;

export function describeState({ main, reference, referenceState, stale, progress }: State, quantity: Quantity): string {
  const underWay = progress.state === 'running' || progress.state === 'held';
  if (main === null) return underWay ? 'Running; the curve comes when the run has ended.' : 'Not run yet.';
  // The record shown stays until the next one is whole: whose it is must be said.
  if (underWay) return 'A run is under way; the curve is still that of the run before.';
  const edited = stale ? 'The job has been edited since: run again. ' : '';
  if (quantity === 'insertion ratio' && reference === null) {
    if (referenceState === 'running') return `${edited}The reference run is under way.`;
    if (referenceState === 'failed') return `${edited}The reference run failed: no ratio.`;
    return `${edited}The job has no reference run: there is nothing to divide by.`;
  }
  if (quantity === 'insertion ratio' && reference !== null) {
    if (reference.trouble !== null) return `${edited}Not to be trusted, the reference run went wrong: ${reference.trouble}`;
    if (reference.stopReason === 'stopped by the person')
      return `${edited}The reference run was stopped by hand: its record is short.`;
  }
  if (main.stopReason === 'time limit')
    return `${edited}Cut off at the time limit with the energy at ${main.energyDb.toFixed(0).replace('-', '−')} dB.`;
  if (main.stopReason === 'stopped by the person') return `${edited}Stopped by hand: the record is short.`;
  if (main.trouble !== null) return `${edited}Not to be trusted: ${main.trouble}`;
  return edited;
}
