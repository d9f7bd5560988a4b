// Owns the words of the run strip: time, steps, throughput, time left, why a run ended.
// Must not know React, stores, or how runs are made.
import type { RunProgress, StopReason } from '../../../workers/protocol.ts';
import { formatQuantity } from '../../base/quantity.ts';
import type { Estimate } from '../../engine/estimate.ts';

/** What the main button does next. */
export type MainAction = 'Run' | 'Hold' | 'Resume';

/** A held run whose job has been edited since cannot go on: it is run anew. */
export function mainAction(state: RunProgress['state'], stale: boolean): MainAction {
  if (state === 'running') return 'Hold';
  return state === 'held' && !stale ? 'Resume' : 'Run';
}

/** 2964 -> "2 964", with a space that does not break. */
export function groupDigits(count: number): string {
  return String(Math.round(count)).replace(/\B(?=(\d{3})+$)/g, '\u00a0');
}

export function throughputWords(megaCellsPerSecond: number): string {
  if (megaCellsPerSecond >= 1000) return `${(megaCellsPerSecond / 1000).toFixed(1)} Gcell/s`;
  return `${megaCellsPerSecond >= 10 ? Math.round(megaCellsPerSecond) : megaCellsPerSecond.toPrecision(2)} Mcell/s`;
}

export function durationWords(seconds: number): string {
  if (!Number.isFinite(seconds)) return 'no end in sight';
  if (seconds < 1) return `${seconds.toFixed(1)} s`;
  if (seconds < 90) return `${Math.round(seconds)} s`;
  if (seconds < 5400) return `${Math.round(seconds / 60)} min`;
  return `${(seconds / 3600).toFixed(1)} h`;
}

export function energyWords(energyDb: number): string {
  if (!Number.isFinite(energyDb)) return 'no energy left';
  return `energy ${energyDb.toFixed(1).replace('-', '−')} dB`;
}

const STOP_WORDS: Record<StopReason, string> = {
  decayed: 'ended: the energy has decayed',
  'time limit': 'ended at the time limit',
  'stopped by the person': 'stopped by hand',
  'not finite': 'stopped: the field is no longer finite',
  growing: 'stopped: the energy rises again',
  broken: 'stopped: the solver broke',
};

/** First the time, then why it ended, then the rest in falling order of interest: a narrow strip cuts the end off. */
export function progressWords(progress: RunProgress, estimate: Estimate | null): { time: string; rest: readonly string[] } {
  const time = formatQuantity(progress.timeSeconds, 'time', 4);
  if (progress.step === 0 && progress.state !== 'running')
    return { time, rest: estimate === null ? [] : estimateWords(estimate) };
  const of =
    progress.stepLimit > 0 ? ` of ${progress.state === 'done' ? 'at most' : 'about'} ${groupDigits(progress.stepLimit)}` : '';
  const ended = progress.stopReason === null ? [] : [STOP_WORDS[progress.stopReason]];
  const rest = [...ended, `step ${groupDigits(progress.step)}${of}`];
  if (progress.megaCellsPerSecond > 0) {
    const on = progress.threads > 1 ? ` on ${progress.threads} threads` : '';
    rest.push(`${throughputWords(progress.megaCellsPerSecond)}${on}`);
  }
  if (progress.state === 'running') rest.push(`${durationWords(progress.secondsLeft)} left`);
  rest.push(energyWords(progress.energyDb));
  if (progress.state === 'held') rest.push('held');
  return { time, rest };
}

function estimateWords(estimate: Estimate): readonly string[] {
  const megabytes = estimate.memoryBytes / 1e6;
  return [
    `${groupDigits(estimate.cellsTotal)} cells`,
    `up to ${megabytes < 10 ? megabytes.toFixed(1) : Math.round(megabytes)} MB`,
    `${groupDigits(estimate.stepLimit)} steps at most`,
    `${durationWords(estimate.secondsAtMost)} at most`,
  ];
}

/** Whichever end is nearer: the time limit, or the fall in energy asked for (Infinity: never). */
export function progressShare(progress: RunProgress, decayDb: number): number {
  if (progress.state === 'done') return 1;
  const ofTime = progress.stepLimit === 0 ? 0 : progress.step / progress.stepLimit;
  return Math.min(1, Math.max(ofTime, -progress.energyDb / decayDb));
}
