import { describe, expect, test } from 'vitest';
import { measureCoverage } from '../../../src/engine/coverage.ts';
import { paintParts } from '../../../src/engine/paint.ts';
import type { XY } from '../../../src/model/job.ts';
import { AIR, METAL, part, rectangle, regularPolygon } from '../../helpers/resolved-jobs.ts';

function borders(count: number, size: number): Float64Array {
  return Float64Array.from({ length: count + 1 }, (_, k) => (k * size) / count);
}

function fractions(rings: XY[][], columns: number, rows: number, width: number, height: number): Float64Array[] {
  const coverage = measureCoverage([{ medium: AIR, rings }], borders(columns, width), borders(rows, height));
  return Array.from({ length: rows }, (_, row) => {
    const out = new Float64Array(columns);
    coverage.fractionInto(out, coverage.classOfRow[row]!, 0);
    return out;
  });
}

function totalArea(rows: Float64Array[], cellArea: number): number {
  return rows.reduce((sum, row) => sum + row.reduce((a, b) => a + b, 0), 0) * cellArea;
}

describe('coverage', () => {
  test('a rectangle off the grid covers its exact share of each cell', () => {
    const rows = fractions([rectangle(0.25, 0.5, 2.75, 1.25)], 4, 3, 4, 3);
    expect([...rows[0]!]).toEqual([0.375, 0.5, 0.375, 0].map((value) => expect.closeTo(value, 14)));
    expect([...rows[1]!]).toEqual([0.1875, 0.25, 0.1875, 0].map((value) => expect.closeTo(value, 14)));
    expect([...rows[2]!]).toEqual([0, 0, 0, 0]);
  });

  test('the fractions of a polygon add up to its shoelace area', () => {
    const ring = regularPolygon([1.03, 0.97], 0.71, 37);
    // Area of a regular n-gon: n r^2 sin(2 pi / n) / 2 (elementary geometry).
    const area = (37 * 0.71 ** 2 * Math.sin((2 * Math.PI) / 37)) / 2;
    expect(totalArea(fractions([ring], 23, 19, 2, 2), (2 / 23) * (2 / 19))).toBeCloseTo(area, 12);
  });

  test('a hole takes its area away', () => {
    const outer = rectangle(0.1, 0.1, 1.9, 1.9);
    const hole = [...rectangle(0.5, 0.6, 1.1, 1.3)].reverse();
    expect(totalArea(fractions([outer, hole], 7, 7, 2, 2), (2 / 7) ** 2)).toBeCloseTo(1.8 * 1.8 - 0.6 * 0.7, 12);
  });

  test('rows of equal content share a class', () => {
    const coverage = measureCoverage([{ medium: AIR, rings: [rectangle(0.3, 1, 0.8, 9)] }], borders(5, 1), borders(10, 10));
    expect([...coverage.classOfRow]).toEqual([0, 1, 1, 1, 1, 1, 1, 1, 1, 0]);
  });
});

describe('painting', () => {
  const sheet = { widthMetres: 4, heightMetres: 4, originMetres: [0, 0] as XY };

  test('a later part hides what lies under it', () => {
    const regions = paintParts(
      [
        part('a', { ...AIR, epsilonRelative: 2 }, rectangle(0, 0, 3, 3)),
        part('b', { ...AIR, epsilonRelative: 5 }, rectangle(1, 1, 4, 4)),
      ],
      sheet,
    );
    const areas = regions.map((region) => [
      region.medium.epsilonRelative,
      totalArea(fractions(region.rings as XY[][], 8, 8, 4, 4), 0.25),
    ]);
    expect(new Map(areas as [number, number][])).toEqual(
      new Map([
        [5, expect.closeTo(9, 6)],
        [2, expect.closeTo(5, 6)],
      ]),
    );
  });

  test('air painted on metal cuts a hole in it', () => {
    const regions = paintParts(
      [part('plate', METAL, rectangle(1, 0, 2, 4)), part('slot', AIR, rectangle(0.5, 1, 2.5, 2))],
      sheet,
    );
    const metal = regions.find((region) => region.medium.metal);
    expect(totalArea(fractions(metal!.rings as XY[][], 8, 8, 4, 4), 0.25)).toBeCloseTo(3, 6);
  });

  test('parts off the sheet leave nothing', () => {
    expect(paintParts([part('far', METAL, rectangle(10, 10, 12, 12))], sheet)).toEqual([]);
  });
});
