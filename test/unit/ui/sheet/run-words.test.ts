// Owns the facts of the run strip's words and of the scale typed in it.
import { describe, expect, test } from 'vitest';
import type { RunProgress } from '../../../../workers/protocol.ts';
import { withUnit } from '../../../../src/ui/sheet/sheet-overlay.ts';
import { readScale } from '../../../../src/ui/sheet/field-image.ts';
import { durationWords, mainAction, progressShare, progressWords, throughputWords } from '../../../../src/ui/sheet/run-words.ts';

const RUNNING: RunProgress = {
  state: 'running',
  step: 2964,
  stepLimit: 7200,
  timeSeconds: 3.42e-9,
  energyDb: -12.34,
  megaCellsPerSecond: 1100,
  threads: 1,
  secondsLeft: 0.2,
  stopReason: null,
  trouble: null,
};

describe('run strip', () => {
  test('a run under way tells time, step, throughput, time left and energy', () => {
    expect(progressWords(RUNNING, null)).toEqual({
      time: '3.42 ns',
      rest: ['step 2\u00a0964 of about 7\u00a0200', '1.1 Gcell/s', '0.2 s left', 'energy −12.3 dB'],
    });
  });

  test('the reason of the end is told in words', () => {
    const { rest } = progressWords({ ...RUNNING, state: 'done', stopReason: 'decayed' }, null);
    expect(rest[0]).toBe('ended: the energy has decayed');
    expect(rest).not.toContain('0.2 s left');
  });

  test('a held run goes on unless its job has been edited', () => {
    expect(mainAction('running', true)).toBe('Hold');
    expect(mainAction('held', false)).toBe('Resume');
    expect(mainAction('held', true)).toBe('Run');
    expect(mainAction('done', false)).toBe('Run');
  });

  test('progress goes by whichever end is nearer', () => {
    expect(progressShare(RUNNING, Infinity)).toBeCloseTo(2964 / 7200, 12);
    expect(progressShare({ ...RUNNING, energyDb: -45 }, 60)).toBeCloseTo(0.75, 12);
    expect(progressShare({ ...RUNNING, state: 'done' }, 60)).toBe(1);
  });

  test('durations and throughputs keep two or three digits', () => {
    expect([0.04, 12.4, 200, 9000, Infinity].map(durationWords)).toEqual(['0.0 s', '12 s', '3 min', '2.5 h', 'no end in sight']);
    expect([0.53, 43.2, 1540].map(throughputWords)).toEqual(['0.53 Mcell/s', '43 Mcell/s', '1.5 Gcell/s']);
  });
});

describe('typed values', () => {
  test('a scale is read in its own unit, bare or with prefix; empty is automatic', () => {
    expect(readScale('2 mV/m', 'Ez')).toBeCloseTo(2e-3, 15);
    expect(readScale('5 mA/m', 'Hz')).toBeCloseTo(5e-3, 15);
    expect(readScale('0.5', 'Hz')).toBe(0.5);
    expect(readScale('', 'Ez')).toBeNull();
    expect(readScale('-1', 'Ez')).toBe('wrong');
    expect(readScale('3 GHz', 'Ez')).toBe('wrong');
  });

  test('a bare number in a dimension keeps the unit that stood there', () => {
    expect(withUnit('5', '0.9 in')).toBe('5 in');
    expect(withUnit('a/2', '3 mm')).toBe('a/2');
    expect(withUnit('5 cm', '3 mm')).toBe('5 cm');
  });
});
