// Owns the check of the line finder on records whose lines are known.
// Must not know the engine.
import { describe, expect, test } from 'vitest';
import { findLine } from '../../oracles/spectral-line.ts';

const DT = 2e-12;
const COUNT = 20000;
const BIN = 1 / (COUNT * DT);

function record(lines: readonly { readonly hertz: number; readonly size: number; readonly phase: number }[]): Float32Array {
  return Float32Array.from({ length: COUNT }, (_, n) =>
    lines.reduce((sum, line) => sum + line.size * Math.cos(2 * Math.PI * line.hertz * n * DT + line.phase), 0),
  );
}

describe('the frequency of a line in a record', () => {
  test.each([7.123456e9, 7.1e9 + 0.37 * BIN, 12.0001e9])('a lone line at %d Hz is found to 1e-4 bin', (hertz) => {
    const found = findLine(record([{ hertz, size: 0.3, phase: 1.1 }]), DT, hertz * 0.98, hertz * 1.013);
    expect(Math.abs(found - hertz) / BIN).toBeLessThan(1e-4);
  });

  test('a neighbour ten times stronger, 12 bins away, moves it by less than 1e-3 bin', () => {
    const hertz = 9e9;
    const lines = [
      { hertz, size: 1, phase: 0.2 },
      { hertz: hertz + 12 * BIN, size: 10, phase: 2 },
    ];
    const found = findLine(record(lines), DT, hertz - 3 * BIN, hertz + 3 * BIN);
    expect(Math.abs(found - hertz) / BIN).toBeLessThan(1e-3);
  });

  test('an interval whose response only rises towards its end is refused', () => {
    const lines = [{ hertz: 9e9, size: 1, phase: 0 }];
    expect(() => findLine(record(lines), DT, 9e9 - 3 * BIN, 9e9 - BIN)).toThrow(/No line/);
  });
});
