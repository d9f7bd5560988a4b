// Owns the facts of snapping.
import { describe, expect, test } from 'vitest';
import { constrainAngle, makeSnapTargets, roundTo, snapTo } from '../../../../src/ui/sheet/snap.ts';
import { simplifyPath } from '../../../../src/model/simplify-path.ts';
import { makeTestJob, mm, resolved } from './sheet-fixture.ts';

const TARGETS = makeSnapTargets(resolved(makeTestJob()));
/** 2 px a millimetre: reach 4.5 mm, grid 5 mm. */
const SCALE = 2000;

describe('snapping', () => {
  test('a corner of a part within reach is met exactly', () => {
    expect(snapTo(mm(149, 21), TARGETS, SCALE, false)).toEqual({ at: mm(150, 20), kind: 'point', words: 'corner of Board' });
  });

  test('middles of sides, centres, probes and the middle of an edge are met', () => {
    expect(snapTo(mm(165.5, 31), TARGETS, SCALE, false).words).toBe('middle of a side of Board');
    expect(snapTo(mm(121, 51), TARGETS, SCALE, false).words).toBe('centre of Rod');
    expect(snapTo(mm(90.5, 70.5), TARGETS, SCALE, false).words).toBe('Probe 1');
    expect(snapTo(mm(101, 99), TARGETS, SCALE, false).words).toBe('middle of the top edge');
  });

  test('along a side the other coordinate still goes by the grid', () => {
    const snap = snapTo(mm(157, 20.9), TARGETS, SCALE, false);
    expect(snap).toEqual({ at: mm(155, 20), kind: 'line', words: 'side of Board' });
  });

  test('edges of the sheet are met', () => {
    expect(snapTo(mm(41.2, 99), TARGETS, SCALE, false)).toEqual({
      at: mm(40, 100),
      kind: 'line',
      words: 'top edge of the sheet',
    });
  });

  test('in the open the grid takes over without a word', () => {
    expect(snapTo(mm(33.4, 81.7), TARGETS, SCALE, false)).toEqual({ at: mm(35, 80), kind: 'grid', words: null });
  });

  test('suspended, the pointer is kept to a tenth of the grid', () => {
    expect(snapTo(mm(149.13, 20.98), TARGETS, SCALE, true)).toEqual({ at: mm(149, 21), kind: 'free', words: null });
  });

  test('a thing does not snap to itself', () => {
    const others = makeSnapTargets(resolved(makeTestJob()), ['rectangle-1']);
    expect(snapTo(mm(149, 21), others, SCALE, false).kind).toBe('grid');
  });

  test('the flattened corners of a disc are no targets', () => {
    expect(TARGETS.points.filter((point) => point.words === 'corner of Rod')).toEqual([]);
  });

  test('rounding leaves no binary noise', () => {
    expect(roundTo(0.30000000000000004, 0.1)).toBe(0.3);
    expect(roundTo(0.0007000000000000001, 0.0001)).toBe(0.0007);
    expect(roundTo(1234, 500)).toBe(1000);
  });

  test('a right angle is exact', () => {
    expect(constrainAngle([0.02, 0.05], [0.021, 0.09], 0.005)).toEqual([0.02, 0.09]);
  });

  test('30 degrees are met from 33', () => {
    const [x, y] = constrainAngle([0, 0], [Math.cos(0.576), Math.sin(0.576)], 0.1);
    expect(Math.atan2(y, x)).toBeCloseTo(Math.PI / 6, 12);
    expect(Math.hypot(x, y)).toBeCloseTo(1, 12);
  });
});

describe('thinning a path', () => {
  test('points on a straight line go', () => {
    expect(simplifyPath([mm(0, 0), mm(1, 0), mm(2, 0), mm(3, 0)], 1e-4)).toEqual([mm(0, 0), mm(3, 0)]);
  });

  test('no point of the path is further from the result than the tolerance', () => {
    const wave = Array.from({ length: 400 }, (_, k) => mm(k / 4, 10 * Math.sin(k / 30)));
    const thin = simplifyPath(wave, 2e-4);
    expect(thin.length).toBeLessThan(60);
    for (const point of wave) {
      const nearest = Math.min(
        ...thin.slice(1).map((to, k) => {
          const from = thin[k] ?? to;
          const [dx, dy] = [to[0] - from[0], to[1] - from[1]];
          const t = Math.max(0, Math.min(1, ((point[0] - from[0]) * dx + (point[1] - from[1]) * dy) / (dx * dx + dy * dy)));
          return Math.hypot(point[0] - from[0] - t * dx, point[1] - from[1] - t * dy);
        }),
      );
      expect(nearest).toBeLessThanOrEqual(2e-4 + 1e-12);
    }
  });

  test('a long zigzag keeps every turn and both ends', () => {
    const zigzag = Array.from({ length: 3000 }, (_, k) => mm(k, (k % 2) * 10));
    expect(simplifyPath(zigzag, 1e-3)).toEqual(zigzag);
  });
});
