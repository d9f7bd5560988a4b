import { describe, expect, it } from 'vitest';
import type { Outline, XY } from '../../../src/model/job.ts';
import {
  countCrossings,
  makeCircle,
  makeLineOutline,
  makeRingOutline,
  outlineArea,
  outlineBounds,
  partContains,
  signedArea,
} from '../../../src/model/outline.ts';

function expectBounds(outline: Outline, left: number, right: number, bottom: number, top: number): void {
  const bounds = outlineBounds(outline);
  for (const [found, wanted] of [
    [bounds.left, left],
    [bounds.right, right],
    [bounds.bottom, bottom],
    [bounds.top, top],
  ] as const) {
    expect(found).toBeCloseTo(wanted, 8);
  }
}

describe('a circle', () => {
  const circle = makeCircle([0.01, -0.02], 0.005);

  it('has the area of the true one', () => {
    expect(signedArea(circle) / (Math.PI * 0.005 ** 2)).toBeCloseTo(1, 12);
  });

  it('strays from the true one by less than 1e-4 of the radius', () => {
    for (const [k, [x, y]] of circle.entries()) {
      const [x1, y1] = circle[(k + 1) % circle.length] ?? [0, 0];
      expect(Math.abs(Math.hypot(x - 0.01, y + 0.02) / 0.005 - 1)).toBeLessThan(1e-4);
      expect(Math.abs(Math.hypot((x + x1) / 2 - 0.01, (y + y1) / 2 + 0.02) / 0.005 - 1)).toBeLessThan(1e-4);
    }
    expect(circle.length).toBeGreaterThanOrEqual(180);
  });
});

describe('a wall', () => {
  it('of one straight piece is the exact rectangle', () => {
    const outline = makeLineOutline(
      [
        [0.01, 0.02],
        [0.05, 0.02],
      ],
      0.002,
      'square',
    );
    expect(outline).toEqual([
      [
        [0.01, 0.019],
        [0.05, 0.019],
        [0.05, 0.021],
        [0.01, 0.021],
      ],
    ]);
  });

  it('turns a right angle with a full corner and cuts its ends square', () => {
    const outline = makeLineOutline(
      [
        [0, 0],
        [0.04, 0],
        [0.04, 0.03],
      ],
      0.002,
      'square',
    );
    // Two bars of 40 and 30 mm by 2 mm share a corner square: outer corner added, inner one taken once.
    expect(outlineArea(outline)).toBeCloseTo(0.07 * 0.002, 10);
    expectBounds(outline, 0, 0.041, -0.001, 0.03);
  });

  it('that closes on itself is a frame with a hole', () => {
    const outline = makeLineOutline(
      [
        [0, 0],
        [0.04, 0],
        [0.04, 0.03],
        [0, 0.03],
        [0, 0],
      ],
      0.002,
      'square',
    );
    expect(outline.length).toBe(2);
    expect(outlineArea(outline)).toBeCloseTo(0.042 * 0.032 - 0.038 * 0.028, 10);
    expect(partContains(outline, 0.02, 0.015)).toBe(false);
    expect(partContains(outline, 0.0005, 0.015)).toBe(true);
  });

  it('that crosses itself counts the crossing once', () => {
    const outline = makeLineOutline(
      [
        [0, 0],
        [0.04, 0],
        [0.04, 0.02],
        [0.02, 0.02],
        [0.02, -0.02],
      ],
      0.002,
      'square',
    );
    const bars = (0.04 + 0.02 + 0.02 + 0.04) * 0.002;
    expect(outlineArea(outline)).toBeCloseTo(bars - 0.002 ** 2, 9);
  });

  it('of points that all coincide has no outline', () => {
    expect(
      makeLineOutline(
        [
          [1, 1],
          [1, 1],
        ],
        0.1,
        'square',
      ),
    ).toEqual([]);
  });

  it('keeps its thickness at micrometre scale, where a nanometre would be coarse', () => {
    const outline = makeLineOutline(
      [
        [0, 0],
        [4e-6, 0],
        [4e-6, 3e-6],
      ],
      2e-7,
      'square',
    );
    expect(outlineArea(outline) / (7e-6 * 2e-7)).toBeCloseTo(1, 6);
  });
});

describe('a stroke', () => {
  it('has round ends', () => {
    const outline = makeLineOutline(
      [
        [0, 0],
        [0.03, 0],
      ],
      0.004,
      'round',
    );
    expect(outlineArea(outline) / (0.03 * 0.004 + Math.PI * 0.002 ** 2)).toBeCloseTo(1, 4);
  });

  it('of one point is a disc', () => {
    expect(outlineArea(makeLineOutline([[0.01, 0.01]], 0.004, 'round'))).toBeCloseTo(Math.PI * 0.002 ** 2, 12);
  });

  it('of many points, painted in stretches, has the area of one painted at once', () => {
    const line = Array.from({ length: 400 }, (_, k): XY => [0.02 * Math.sin(k / 7), k * 1e-4]);
    const long = outlineArea(makeLineOutline(line, 0.006, 'round'));
    // A fine raster as the judge: inside means within half a width of some point of the line.
    const step = 2e-4;
    let covered = 0;
    for (let x = -0.024; x < 0.024; x += step) {
      for (let y = -0.004; y < 0.044; y += step) {
        if (line.some(([px, py], k) => distanceToPiece([x, y], [px, py], line[k + 1] ?? [px, py]) < 0.003))
          covered += step * step;
      }
    }
    expect(long / covered).toBeCloseTo(1, 2);
  });
});

function distanceToPiece(p: XY, a: XY, b: XY): number {
  const [ux, uy] = [b[0] - a[0], b[1] - a[1]];
  const length = ux * ux + uy * uy;
  const t = length === 0 ? 0 : Math.max(0, Math.min(1, ((p[0] - a[0]) * ux + (p[1] - a[1]) * uy) / length));
  return Math.hypot(p[0] - a[0] - t * ux, p[1] - a[1] - t * uy);
}

describe('a polygon', () => {
  it('drawn clockwise is turned counter-clockwise, its points untouched', () => {
    const outline = makeRingOutline([
      [0, 0],
      [0, 1],
      [1, 1],
      [1, 0],
    ]);
    expect(outline).toEqual([
      [
        [1, 0],
        [1, 1],
        [0, 1],
        [0, 0],
      ],
    ]);
  });

  it('that crosses itself keeps both lobes', () => {
    const outline = makeRingOutline([
      [0, 0],
      [0.01, 0.01],
      [0.01, 0],
      [0, 0.01],
    ]);
    expect(outlineArea(outline)).toBeCloseTo(5e-5, 12);
    expect(outline.every((ring) => signedArea(ring) > 0)).toBe(true);
  });

  it('with a keyhole has a hole', () => {
    const outline = makeRingOutline([
      [0, 0],
      [4, 0],
      [4, 4],
      [0, 4],
      [0, 0],
      [1, 1],
      [1, 3],
      [3, 3],
      [3, 1],
      [1, 1],
    ]);
    expect(outlineArea(outline)).toBeCloseTo(12, 6);
    expect(partContains(outline, 2, 2)).toBe(false);
    expect(partContains(outline, 0.5, 2)).toBe(true);
  });

  it('without area has no outline', () => {
    expect(
      makeRingOutline([
        [0, 0],
        [1, 1],
        [2, 2],
      ]),
    ).toEqual([]);
  });
});

describe('crossings', () => {
  it('are counted for pieces that are not neighbours', () => {
    expect(
      countCrossings(
        [
          [0, 0],
          [2, 2],
          [2, 0],
          [0, 2],
        ],
        10,
      ),
    ).toBe(1);
    expect(
      countCrossings(
        [
          [0, 0],
          [1, 0],
          [2, 0],
        ],
        10,
      ),
    ).toBe(0);
  });
});
