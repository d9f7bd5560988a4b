import { describe, expect, test } from 'vitest';
import { CURRENT_LINE } from '../../../../src/app/line-styles.ts';
import {
  componentNames,
  makeCurves,
  makeSpectrumColumns,
  makeTraceColumns,
  readAt,
  unitOf,
  type CurveChoice,
  type DrawnRun,
} from '../../../../src/ui/readings/curve-data.ts';
import { mergeColumns } from '../../../../src/ui/readings/merge-columns.ts';
import { differenceWords } from '../../../../src/ui/readings/difference-words.ts';
import { axisUnit, tickWords, unevenTickWords } from '../../../../src/ui/readings/scale-words.ts';
import { describeState } from '../../../../src/ui/readings/state-words.ts';
import { NO_PROGRESS } from '../../../../src/app/run-store.ts';
import type { RunRecord } from '../../../../workers/protocol.ts';

/** A record with one probe whose Ez spectrum is given; its trace is a short pulse. */
function record(frequencies: number[], ez: number[], drive: number[]): RunRecord {
  const samples = Float32Array.from({ length: 400 }, (_, n) => Math.exp(-(((n - 60) / 12) ** 2)));
  const flat = { re: Float64Array.from(ez), im: new Float64Array(ez.length) };
  return {
    role: 'main',
    planHash: '0',
    components: ['Ez', 'Hx', 'Hy'],
    dtSeconds: 1e-11,
    steps: 399,
    stopReason: 'decayed',
    trouble: null,
    energyDb: -60,
    wallSeconds: 1,
    threads: 1,
    megaCellsPerSecond: 1,
    estimate: {} as RunRecord['estimate'],
    frequenciesHertz: Float64Array.from(frequencies),
    traces: [{ probeId: 'p', samples: [samples, samples, samples] }],
    spectra: [{ probeId: 'p', components: [flat, flat, flat] }],
    driveSpectrum: { re: Float64Array.from(drive), im: new Float64Array(drive.length) },
  };
}

const choice: CurveChoice = { quantity: 'insertion ratio', probeId: 'p', component: 'Ez', rms: false };
const drawn = (id: string, main: RunRecord, reference: RunRecord | null): DrawnRun => ({
  id,
  name: id,
  main,
  reference,
  style: CURRENT_LINE,
});

describe('the curves', () => {
  const reference = record([1e9, 2e9, 3e9], [1, 1, 1], [1, 1, 1]);
  const main = record([1e9, 2e9, 3e9], [0.1, 0.01, 0.5], [1, 1, 0.001]);

  test('of runs without a reference are left out of the insertion ratio and kept in the level', () => {
    const runs = [drawn('a', main, reference), drawn('b', main, null)];
    expect(makeCurves(runs, choice).map(({ id }) => id)).toEqual(['a']);
    expect(makeCurves(runs, { ...choice, quantity: 'level' }).map(({ id }) => id)).toEqual(['a', 'b']);
  });

  test('break where a point is not known, and the unknown part joins its neighbours', () => {
    const { x, known, unknown } = makeSpectrumColumns(makeCurves([drawn('a', main, reference)], choice));
    expect(x).toEqual([1e9, 2e9, 3e9]);
    expect(known[0]!.map((value) => (value === null ? null : Math.round(value)))).toEqual([-20, -40, null]);
    expect(unknown[0]!.map((value) => (value === null ? null : Math.round(value)))).toEqual([null, -40, -6]);
  });

  test('of runs with other frequencies stand over one axis', () => {
    const other = record([1.5e9, 2e9], [0.5, 0.5], [1, 1]);
    const runs = [drawn('a', main, reference), drawn('b', other, record([1.5e9, 2e9], [1, 1], [1, 1]))];
    const { x, known } = makeSpectrumColumns(makeCurves(runs, choice));
    expect(x).toEqual([1e9, 1.5e9, 2e9, 3e9]);
    expect(known[1]!.map((value) => (value === null ? null : Math.round(value)))).toEqual([null, -6, -6, null]);
  });

  test('are read at a frequency of the run, and nowhere else', () => {
    const [curve] = makeCurves([drawn('a', main, reference)], choice);
    expect(readAt(curve!, 2e9)!.db).toBeCloseTo(-40, 9);
    expect(readAt(curve!, 2.2e9)).toBeNull();
  });
});

test('components end with the two vectors, and units follow the quantity', () => {
  expect(componentNames(['Hz', 'Ex', 'Ey'])).toEqual(['Hz', 'Ex', 'Ey', '|E|', '|H|']);
  expect(unitOf({ ...choice, quantity: 'level', component: '|H|', rms: true })).toBe('dBµA/m RMS');
  expect(unitOf({ ...choice, quantity: 'spectrum', component: 'Ex' })).toBe('dB(V/m/Hz)');
});

describe('a long trace', () => {
  test('is thinned without losing its peaks', () => {
    const samples = new Float32Array(100_000);
    samples[54_321] = 7;
    samples[54_330] = -9;
    const { x, y } = makeTraceColumns(samples, samples.length, 1e-12, 2000);
    expect(y.length).toBeLessThanOrEqual(2100);
    expect(Math.max(...y)).toBe(7);
    expect(Math.min(...y)).toBe(-9);
    expect(x.every((t, k) => k === 0 || t > x[k - 1]!)).toBe(true);
  });

  test('with another beside it runs over the times it lacks', () => {
    const merged = mergeColumns([
      { x: [0, 2, 4], y: [0, 2, 4] },
      { x: [0, 1, 4], y: [0, 10, 40] },
    ]);
    expect(merged.x).toEqual([0, 1, 2, 4]);
    expect(merged.columns).toEqual([
      [0, 1, 2, 4],
      [0, 10, 20, 40],
    ]);
  });
});

test('an axis takes one SI prefix and as few digits as tell ticks apart', () => {
  expect(axisUnit(6e9, 'Hz')).toEqual({ factor: 1e9, unit: 'GHz' });
  expect(axisUnit(0.0071, 'V/m')).toEqual({ factor: 1e-3, unit: 'mV/m' });
  expect(tickWords([-1e9, 0, 1e9], 1e9)).toEqual(['−1', '0', '1']);
  expect(tickWords([8.2e9, 8.4e9], 1e9)).toEqual(['8.2', '8.4']);
});

test('ticks at uneven steps, as on a logarithmic axis, keep their own digits', () => {
  expect(unevenTickWords([8e8, 1e9, 2e9, 6e9], 1e9)).toEqual(['0.8', '1', '2', '6']);
});

test('two cursors read a difference only where both are known', () => {
  expect(differenceWords({ db: -10, cause: 0 }, { db: -14.5, cause: 0 })).toBe('−4.50 dB');
  expect(differenceWords({ db: -10, cause: 0 }, { db: -14.5, cause: 1 })).toBe('unknown');
  expect(differenceWords({ db: -10, cause: 3 }, { db: -14.5, cause: 0 })).toBe('unknown');
});

describe('the state of a reading is said in words', () => {
  const main = record([1e9], [1], [1]);
  const base = { main, reference: main, referenceState: 'done', stale: false, progress: NO_PROGRESS } as const;

  test('nothing to say of a finished run', () => {
    expect(describeState(base, 'insertion ratio')).toBe('');
  });

  test('not run, edited since, without reference, cut off', () => {
    expect(describeState({ ...base, main: null }, 'level')).toBe('Not run yet.');
    expect(describeState({ ...base, stale: true }, 'level')).toMatch(/edited since/);
    expect(describeState({ ...base, reference: null, referenceState: 'none' }, 'insertion ratio')).toMatch(
      /nothing to divide by/,
    );
    expect(describeState({ ...base, reference: null, referenceState: 'failed' }, 'insertion ratio')).toMatch(/failed/);
    expect(describeState({ ...base, main: { ...main, stopReason: 'time limit', energyDb: -31.4 } }, 'level')).toMatch(/−31 dB/);
  });

  test('a run under way does not own the curve of the run before', () => {
    const running = { ...base, progress: { ...NO_PROGRESS, state: 'running' } } as const;
    expect(describeState(running, 'level')).toMatch(/run before/);
    expect(describeState({ ...running, main: null }, 'level')).toMatch(/when the run has ended/);
  });

  test('a reference run that went wrong or was cut short is named for the ratio, and only for the ratio', () => {
    const broken = { ...base, reference: { ...main, trouble: 'the field grew at step 9' } };
    expect(describeState(broken, 'insertion ratio')).toMatch(/reference run went wrong: the field grew at step 9/);
    expect(describeState(broken, 'level')).toBe('');
    const short = { ...base, reference: { ...main, stopReason: 'stopped by the person' as const } };
    expect(describeState(short, 'insertion ratio')).toMatch(/reference run was stopped by hand/);
  });
});
