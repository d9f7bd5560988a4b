// Owns the words for a run in the run book.
// Must not know components.
import { formatQuantity } from '../../base/quantity.ts';
import type { RunProgress, RunRecord } from '../../../workers/protocol.ts';

/** What the run on show is doing. */
export function describeCurrent(progress: RunProgress, hasRecord: boolean, stale: boolean): string {
  switch (progress.state) {
    case 'running':
      return 'running';
    case 'held':
      return `held at ${formatQuantity(progress.timeSeconds, 'time', 3)}`;
    case 'ready':
      return hasRecord ? (stale ? 'of the job before the last edits' : 'the readings are of the last run') : 'not run yet';
    case 'done':
      return stale ? 'of the job before the last edits' : (progress.stopReason ?? 'done');
  }
}

/** "decayed, 4 213 steps, −61.2 dB": for the small print of a kept run. */
export function describeRecord({ stopReason, dtSeconds, steps, energyDb }: RunRecord): string {
  const time = formatQuantity(dtSeconds * steps, 'time', 3);
  return `${stopReason} at ${time}, energy at ${energyDb.toFixed(0).replace('-', '\u2212')} dB`;
}

/** Day and time of day, in the person's own way of writing. */
export function describeMoment(iso: string): string {
  const moment = new Date(iso);
  if (Number.isNaN(moment.getTime())) return '';
  return moment.toLocaleString(undefined, { day: 'numeric', month: 'short', hour: '2-digit', minute: '2-digit' });
}
