// Owns what the plots draw: columns of numbers made from runs, pure and tested.
// Must not know React, uPlot or stores.
import type { LineStyle } from '../../app/line-styles.ts';
import { insertionCurve, levelCurve, spectrumCurve, type Curve } from '../../engine/insertion.ts';
import type { ProbeTrace, RunRecord } from '../../../workers/protocol.ts';

export type Quantity = 'insertion ratio' | 'level' | 'spectrum';

export interface CurveChoice {
  readonly quantity: Quantity;
  readonly probeId: string;
  /** 'Ez', or '|E|'. */
  readonly component: string;
  readonly rms: boolean;
}

/** A run to draw: the current one first, then those laid over it. */
export interface DrawnRun {
  readonly id: string;
  readonly name: string;
  readonly main: RunRecord;
  readonly reference: RunRecord | null;
  readonly style: LineStyle;
}

export interface DrawnCurve extends DrawnRun {
  readonly curve: Curve;
}

/** What can be chosen as a component: the three fields and the two vectors. */
export function componentNames(components: readonly string[]): string[] {
  return [...components, '|E|', '|H|'];
}

/** Curves of the runs that have the chosen probe, component and reference. */
export function makeCurves(runs: readonly DrawnRun[], choice: CurveChoice): DrawnCurve[] {
  return runs.flatMap((run) => {
    const curve = curveOf(run, choice);
    return curve === null ? [] : [{ ...run, curve }];
  });
}

function curveOf({ main, reference }: DrawnRun, { quantity, probeId, component, rms }: CurveChoice): Curve | null {
  if (quantity === 'level') return levelCurve(main, probeId, component, rms);
  if (quantity === 'spectrum') return spectrumCurve(main, probeId, component);
  return reference === null ? null : insertionCurve(main, reference, probeId, component);
}

export function unitOf({ quantity, component, rms }: CurveChoice): string {
  const electric = component.includes('E');
  if (quantity === 'insertion ratio') return 'dB';
  if (quantity === 'spectrum') return electric ? 'dB(V/m/Hz)' : 'dB(A/m/Hz)';
  return `${electric ? 'dBµV/m' : 'dBµA/m'} ${rms ? 'RMS' : 'peak'}`;
}

/** A column of a plot: null where nothing is drawn. */
export type Column = (number | null)[];

export interface SpectrumColumns {
  /** Frequencies of all runs, rising. */
  readonly x: number[];
  /** Per run: where it is known, and where it is not (joined to its known neighbours). */
  readonly known: Column[];
  readonly unknown: Column[];
  /** Floor of the first run. */
  readonly floor: Column;
}

/** Puts curves over one axis of frequencies. */
export function makeSpectrumColumns(curves: readonly DrawnCurve[]): SpectrumColumns {
  const x = [...new Set(curves.flatMap(({ main }) => [...main.frequenciesHertz]))].sort((a, b) => a - b);
  const places = new Map(x.map((f, k) => [f, k]));
  const empty = (): Column => x.map(() => null);
  const known: Column[] = [];
  const unknown: Column[] = [];
  const floor = empty();
  curves.forEach(({ main, curve }, n) => {
    const clear = empty();
    const hidden = empty();
    main.frequenciesHertz.forEach((f, k) => {
      const at = places.get(f)!;
      const value = finite(curve.db[k]!);
      const doubtful = curve.cause[k] !== 0;
      if (!doubtful) clear[at] = value;
      const besideDoubt = curve.cause[k - 1] || curve.cause[k + 1];
      if (doubtful || besideDoubt) hidden[at] = value;
      if (n === 0) floor[at] = finite(curve.floorDb[k]!);
    });
    known.push(clear);
    unknown.push(hidden);
  });
  return { x, known, unknown, floor };
}

function finite(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}

/** Reading of a curve at one frequency of its run: a value, or why there is none. */
export function readAt(
  { main, curve }: DrawnCurve,
  frequencyHertz: number,
): { readonly db: number; readonly cause: number } | null {
  const k = main.frequenciesHertz.findIndex((f) => Math.abs(f - frequencyHertz) <= 1e-9 * frequencyHertz);
  return k < 0 ? null : { db: curve.db[k]!, cause: curve.cause[k]! };
}

/**
 * Samples of a trace as plot columns, at most `most` points: of longer ones the least and largest of each stretch, so that
 * no peak is lost.
 */
export function makeTraceColumns(
  samples: Float32Array,
  count: number,
  dtSeconds: number,
  most: number,
): { x: number[]; y: number[] } {
  const x: number[] = [];
  const y: number[] = [];
  const stretch = Math.max(1, Math.ceil((2 * count) / most));
  if (stretch <= 2) {
    for (let n = 0; n < count; n++) {
      x.push(n * dtSeconds);
      y.push(samples[n]!);
    }
    return { x, y };
  }
  for (let from = 0; from < count; from += stretch) {
    let low = from;
    let high = from;
    for (let n = from; n < Math.min(count, from + stretch); n++) {
      if (samples[n]! < samples[low]!) low = n;
      if (samples[n]! > samples[high]!) high = n;
    }
    for (const n of low === high ? [low] : low < high ? [low, high] : [high, low]) {
      x.push(n * dtSeconds);
      y.push(samples[n]!);
    }
  }
  return { x, y };
}

export function traceOf(traces: readonly ProbeTrace[], probeId: string, component: number): Float32Array | null {
  return traces.find((trace) => trace.probeId === probeId)?.samples[component] ?? null;
}
