import { describe, expect, test } from 'vitest';
import { makeAxis, makeGrid, type Grid } from '../../../src/engine/grid.ts';
import type { ResolvedJob } from '../../../src/model/job.ts';
import { AIR, METAL, part, rectangle, resolvedJob } from '../../helpers/resolved-jobs.ts';

function gridOf(change: Partial<ResolvedJob>): Grid {
  const grid = makeGrid(resolvedJob(change));
  if (!grid.ok) throw new Error(grid.errors[0].message);
  return grid.value;
}

describe('the grid', () => {
  test('cells per wavelength are counted in the densest medium at the top of the band', () => {
    const grid = gridOf({ parts: [part('glass', { ...AIR, epsilonRelative: 4 }, rectangle(0.1, 0.1, 0.2, 0.2))] });
    // Wavelength at 6 GHz in eps 4: c / (6e9 * 2).
    const wavelength = 299792458 / 12e9;
    expect(grid.shortestWavelengthMetres).toBeCloseTo(wavelength, 12);
    expect(wavelength / grid.dxMetres).toBeGreaterThanOrEqual(20 - 1e-9);
    expect(wavelength / grid.dxMetres).toBeLessThan(20.2);
  });

  test('the time step is 0.99 of the two-dimensional Courant limit', () => {
    const grid = gridOf({});
    // Courant, Friedrichs and Lewy 1928, for the Yee lattice in two dimensions.
    const limit = 1 / (299792458 * Math.sqrt(1 / grid.dxMetres ** 2 + 1 / grid.dyMetres ** 2));
    expect(grid.dtSeconds / limit).toBeCloseTo(0.99, 9);
  });

  test('the count is raised so that drawn edges of metal fall on lines', () => {
    const grid = gridOf({ parts: [part('door', METAL, rectangle(0.1, 0, 0.102, 0.2))] });
    for (const edge of [0.1, 0.102]) {
      const cells = edge / grid.dxMetres;
      expect(Math.abs(cells - Math.round(cells))).toBeLessThan(0.3);
    }
    const bare = gridOf({});
    expect(grid.x.cells).toBeGreaterThanOrEqual(bare.x.cells);
    expect(grid.x.cells).toBeLessThanOrEqual(1.3 * bare.x.cells + 1);
  });

  test('a typed cell size is kept when it fits and adjusted with a remark when it does not', () => {
    const kept = gridOf({ grid: { cells: { xMetres: 2e-3, yMetres: 2e-3 }, absorberCells: 10, courant: 0.9 } });
    expect([kept.x.cells, kept.y.cells, kept.remarks.length]).toEqual([150, 100, 0]);
    const adjusted = gridOf({ grid: { cells: { xMetres: 7e-3, yMetres: 2e-3 }, absorberCells: 10, courant: 0.9 } });
    expect(adjusted.x.cells).toBe(43);
    expect(adjusted.remarks.map((remark) => remark.code)).toEqual(['cell size adjusted']);
  });

  test('absurdly fine cells are refused with the number', () => {
    const grid = makeGrid(resolvedJob({ grid: { cells: { xMetres: 1e-9, yMetres: 1e-3 }, absorberCells: 10, courant: 0.9 } }));
    expect(grid.ok ? null : grid.errors[0].message).toMatch(/300000000 cells along x are more than 60000/);
  });
});

describe('an axis', () => {
  test('u stands on the lines for E out of plane and between them for H', () => {
    const e = makeAxis('E out of plane', 4, 1, 'metal', 'metal', 10);
    const h = makeAxis('H out of plane', 4, 1, 'metal', 'metal', 10);
    expect([...e.position]).toEqual([1, 2, 3]);
    expect([...e.linkOpen]).toEqual([1, 1, 1, 1]);
    expect([...h.position]).toEqual([0.5, 1.5, 2.5, 3.5]);
    expect([...h.linkOpen]).toEqual([0, 1, 1, 1, 0]);
  });

  test('a magnetic edge has half a cell (E out of plane) or half a link (H out of plane)', () => {
    const e = makeAxis('E out of plane', 4, 1, 'magnetic', 'metal', 10);
    const h = makeAxis('H out of plane', 4, 1, 'magnetic', 'metal', 10);
    expect([...e.position]).toEqual([0, 1, 2, 3]);
    expect([...e.width]).toEqual([0.5, 1, 1, 1]);
    expect([...e.linkOpen]).toEqual([0, 1, 1, 1, 1]);
    expect([...h.linkLength]).toEqual([0.5, 1, 1, 1, 0.5]);
    expect([...h.linkOpen]).toEqual([1, 1, 1, 1, 0]);
  });

  test('absorbers add cells outside the sheet, and repeating edges none', () => {
    const open = makeAxis('E out of plane', 4, 1, 'absorbing', 'absorbing', 10);
    expect([open.lines.length, open.lines[0], open.before, open.after]).toEqual([25, -10, 10, 10]);
    const ring = makeAxis('E out of plane', 4, 1, 'repeating', 'repeating', 10);
    expect([ring.count, ring.lines.length, ring.repeats]).toEqual([4, 5, true]);
    expect([...ring.width]).toEqual([1, 1, 1, 1]);
  });
});
