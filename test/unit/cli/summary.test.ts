// Owns the facts of the summary a run leaves for programs.
// Must not know the engine: the records are written by hand.
import { describe, expect, test } from 'vitest';
import { makeSummary } from '../../../src/cli/summary.ts';
import type { SummaryInput } from '../../../src/cli/summary.ts';
import { makeEmptyJob } from '../../../src/model/new-job.ts';
import type { RunRecord, StopReason } from '../../../workers/protocol.ts';

const FREQUENCIES = [1e9, 1.5e9, 2e9];

function makeRecord(role: RunRecord['role'], stopReason: StopReason = 'decayed'): RunRecord {
  return {
    role,
    planHash: `hash of ${role}`,
    components: ['Ez', 'Hx', 'Hy'],
    dtSeconds: 2e-12,
    steps: 500,
    stopReason,
    trouble: null,
    energyDb: -60.5,
    wallSeconds: 0.25,
    threads: 1,
    megaCellsPerSecond: 800,
    estimate: {
      cellsX: 200,
      cellsY: 100,
      cellsTotal: 26400,
      dxMetres: 1e-3,
      dyMetres: 1e-3,
      dtSeconds: 2e-12,
      stepLimit: 1000,
      memoryBytes: 1_234_567,
      secondsAtMost: 1,
      cellsPerShortestWavelength: 20,
      phaseErrorDegrees: 1.5,
      launch: null,
      remarks: [{ code: 'coarse grid', message: 'Few cells.', path: 'grid.cells' }],
    },
    frequenciesHertz: Float64Array.from(FREQUENCIES),
    traces: [],
    spectra: [],
    driveSpectrum: { re: new Float64Array(3), im: new Float64Array(3) },
  };
}

function makeInput(changes: Partial<SummaryInput> = {}): SummaryInput {
  const ratio = { re: [1, 0.5, 0], im: [0, -0.5, 0.1], belowFloor: [false, false, true] };
  const nothing = { re: [Number.NaN, Number.NaN, Number.NaN], im: [0, 0, 0], belowFloor: [true, true, true] };
  return {
    job: { ...makeEmptyJob(), title: 'Slot', probes: [{ id: 'p1', name: 'Behind', at: ['1 mm', '2 mm'] }] },
    version: '9.8.7',
    listedHertz: [1.5e9, 2e9],
    main: makeRecord('main'),
    reference: makeRecord('reference'),
    insertion: [{ probeId: 'p1', components: [ratio, nothing, ratio] }],
    complete: true,
    ...changes,
  };
}

describe('H in the summary', () => {
  test('is given for each listed frequency, in decibels besides real and imaginary part', () => {
    const [probe] = makeSummary(makeInput()).probes;
    expect(probe?.listed.map(({ frequencyHertz }) => frequencyHertz)).toEqual([1.5e9, 2e9]);
    // |0.5 - 0.5j| = 1/sqrt(2): -3.0103 dB.
    expect(probe?.listed[0]?.h?.Ez).toEqual({ re: 0.5, im: -0.5, db: expect.closeTo(-3.0103, 4), belowFloor: false });
    expect(probe?.listed[1]?.h?.Ez).toEqual({ re: 0, im: 0.1, db: expect.closeTo(-20, 9), belowFloor: true });
  });

  test('is null, not a hole in the JSON, where there is nothing to divide by', () => {
    const [probe] = makeSummary(makeInput()).probes;
    expect(probe?.listed[0]?.h?.Hx).toEqual({ re: null, im: expect.any(Number), db: null, belowFloor: true });
  });

  test('is null without a reference run', () => {
    const summary = makeSummary(makeInput({ reference: null, insertion: null }));
    expect(summary.reference).toBeNull();
    expect(summary.probes[0]?.listed.map(({ h }) => h)).toEqual([null, null]);
  });
});

test('the summary survives JSON unchanged', () => {
  const summary = makeSummary(makeInput());
  expect(JSON.parse(JSON.stringify(summary))).toEqual(summary);
});

test('a stopped run says so', () => {
  const summary = makeSummary(makeInput({ main: makeRecord('main', 'stopped by the person'), complete: false }));
  expect(summary).toMatchObject({ complete: false, main: { stopReason: 'stopped by the person' } });
});

test('grid, step, time, energy, memory, throughput and remarks are the record’s own', () => {
  const summary = makeSummary(makeInput());
  expect(summary).toMatchObject({
    program: 'Guidewall 9.8.7',
    job: { title: 'Slot' },
    grid: { cellsX: 200, cellsY: 100, cellsTotal: 26400, dxMetres: 1e-3 },
    timeStepSeconds: 2e-12,
    memoryBytes: 1_234_567,
    remarks: [{ code: 'coarse grid' }],
    main: { planHash: 'hash of main', steps: 500, timeSeconds: 1e-9, energyDb: -60.5, megaCellsPerSecond: 800 },
    reference: { planHash: 'hash of reference' },
  });
});

test('the same job has the same hash, another job another', () => {
  const hash = (title: string): string => makeSummary(makeInput({ job: { ...makeEmptyJob(), title } })).job.sha256;
  expect(hash('a')).toBe(hash('a'));
  expect(hash('a')).not.toBe(hash('b'));
});
