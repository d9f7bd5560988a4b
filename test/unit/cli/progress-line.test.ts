// Owns the facts of how progress is shown on a terminal and in a log.
// Must not know the session.
import { describe, expect, test } from 'vitest';
import type { RunProgress } from '../../../workers/protocol.ts';
import { describeProgress, duration, makeProgressLine } from '../../../src/cli/progress-line.ts';

function makeProgress(step: number, changes: Partial<RunProgress> = {}): RunProgress {
  return {
    state: 'running',
    step,
    stepLimit: 1000,
    timeSeconds: step * 1e-12,
    energyDb: -12.34,
    megaCellsPerSecond: 900.4,
    threads: 1,
    secondsLeft: 75,
    stopReason: null,
    trouble: null,
    ...changes,
  };
}

function makeRecorder(isTTY: boolean) {
  const written: string[] = [];
  const clock = { milliseconds: 0 };
  const line = makeProgressLine({ isTTY, write: (text) => written.push(text) }, () => clock.milliseconds);
  return { written, clock, line };
}

describe('on a terminal', () => {
  test('the bar redraws in place', () => {
    const { written, clock, line } = makeRecorder(true);
    line.show('main', makeProgress(100));
    clock.milliseconds = 150;
    line.show('main', makeProgress(200));
    expect(written).toHaveLength(2);
    for (const text of written) expect(text).toMatch(/^\r.*\[K$/);
  });

  test('redraws faster than ten a second are skipped, the last one never', () => {
    const { written, clock, line } = makeRecorder(true);
    for (let step = 0; step < 100; step++) {
      clock.milliseconds = step;
      line.show('main', makeProgress(step));
    }
    line.show('main', makeProgress(100, { state: 'done', stopReason: 'decayed' }));
    expect(written).toHaveLength(2);
    expect(written[1]).toContain('decayed');
  });

  test('the reference run gets a line of its own', () => {
    const { written, line } = makeRecorder(true);
    line.show('main', makeProgress(100));
    line.show('reference', makeProgress(1));
    line.end();
    expect(written.join('').split('\n')).toHaveLength(3);
  });
});

describe('in a log', () => {
  test('lines are plain, whole and at least two seconds apart', () => {
    const { written, clock, line } = makeRecorder(false);
    for (let step = 0; step <= 500; step++) {
      clock.milliseconds = step * 10;
      line.show('main', makeProgress(step));
    }
    line.end();
    expect(written).toHaveLength(3);
    for (const text of written)
      expect(text).toMatch(/^main +step \d+ of 1000, energy -12\.3 dB, 900 Mcell\/s, 1 min 15 s left at most\n$/);
  });
});

test('the bar is full when the run is done, however early it decayed', () => {
  const text = describeProgress('main', makeProgress(10, { state: 'done', stopReason: 'decayed' }), true);
  expect(text).toContain(`[${'#'.repeat(24)}]`);
});

test('a run without a wave yet shows no energy in decibels', () => {
  expect(describeProgress('main', makeProgress(0, { energyDb: -Infinity }), false)).toContain('energy none yet');
});

test.each([
  [0.44, '0.4 s'],
  [12.4, '12 s'],
  [59.7, '1 min 0 s'],
  [200, '3 min 20 s'],
  [7500, '2 h 5 min'],
  [Infinity, 'unknown time'],
])('%d seconds read as %s', (seconds, text) => {
  expect(duration(seconds)).toBe(text);
});
