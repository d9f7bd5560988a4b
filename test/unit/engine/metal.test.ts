import { describe, expect, test } from 'vitest';
import { makeGrid, type Grid } from '../../../src/engine/grid.ts';
import { markMetal } from '../../../src/engine/metal.ts';
import { paintParts } from '../../../src/engine/paint.ts';
import type { Section, XY } from '../../../src/model/job.ts';
import { edges, METAL, part, rectangle, resolvedJob } from '../../helpers/resolved-jobs.ts';

/** 20 by 10 cells of 1 mm between metal edges. */
function small(section: Section, ...outline: XY[][]): { grid: Grid; marks: NonNullable<ReturnType<typeof markMetal>> } {
  const job = resolvedJob({
    section,
    sheet: { ...resolvedJob().sheet, widthMetres: 0.02, heightMetres: 0.01, edges: edges('metal') },
    grid: { cells: { xMetres: 1e-3, yMetres: 1e-3 }, absorberCells: 10, courant: 0.99 },
    parts: [part('metal', METAL, ...outline)],
  });
  const grid = makeGrid(job);
  if (!grid.ok) throw new Error(grid.errors[0].message);
  const marks = markMetal(grid.value, paintParts(job.parts, job.sheet));
  if (marks === null) throw new Error('no metal found');
  return { grid: grid.value, marks };
}

/** Columns (1-based grid lines) of dead u in the middle row, E out of plane. */
function deadColumns(...outline: XY[][]): number[] {
  const { grid, marks } = small('E out of plane', ...outline);
  const row = 4;
  return [...Array(grid.x.count).keys()].filter((i) => marks.uDead[row * grid.x.count + i] === 1).map((i) => i + 1);
}

/** Grid lines blocked in the middle row, H out of plane. */
function blockedLines(...outline: XY[][]): number[] {
  const { grid, marks } = small('H out of plane', ...outline);
  const row = 4;
  return [...Array(grid.x.count + 1).keys()].filter((i) => marks.yBlocked[row * (grid.x.count + 1) + i] === 1);
}

const wall = (from: number, to: number): XY[] => rectangle(from * 1e-3, 0, to * 1e-3, 0.01);

describe('metal lies on the nearest grid lines', () => {
  test('a wall between lines 5 and 7 marks 5, 6 and 7 in both sections', () => {
    expect(deadColumns(wall(5, 7))).toEqual([5, 6, 7]);
    expect(blockedLines(wall(5, 7))).toEqual([5, 6, 7]);
  });

  test('edges 0.4 cell off are moved back to their lines', () => {
    for (const [from, to] of [
      [5.4, 7.4],
      [4.6, 6.6],
      [4.6, 7.4],
    ] as const) {
      const wanted = [Math.round(from), Math.round(to)];
      expect(deadColumns(wall(from, to)).filter((_, k, all) => k === 0 || k === all.length - 1)).toEqual(wanted);
      expect(blockedLines(wall(from, to)).filter((_, k, all) => k === 0 || k === all.length - 1)).toEqual(wanted);
    }
  });

  test('a wall much thinner than a cell is one closed line, wherever it stands', () => {
    for (const at of [5, 5.2, 5.4, 5.6, 5.8]) {
      expect(deadColumns(wall(at, at + 0.01))).toEqual([Math.round(at)]);
      expect(blockedLines(wall(at, at + 0.01))).toEqual([Math.round(at)]);
    }
  });

  test('a thin slanted wall across the sheet lets no path of links through', () => {
    const slanted: XY[] = [
      [0.004, 0],
      [0.00405, 0],
      [0.01405, 0.01],
      [0.014, 0.01],
    ];
    for (const section of ['E out of plane', 'H out of plane'] as const) {
      const { grid, marks } = small(section, slanted);
      const nx = grid.x.count;
      const reached = new Uint8Array(nx * grid.y.count);
      const queue = [Math.floor(grid.y.count / 2) * nx];
      reached[queue[0]!] = 1;
      while (queue.length > 0) {
        const p = queue.pop()!;
        const i = p % nx;
        const j = Math.floor(p / nx);
        const go = (ni: number, nj: number, blocked: boolean): void => {
          if (ni < 0 || nj < 0 || ni >= nx || nj >= grid.y.count || blocked) return;
          const q = nj * nx + ni;
          if (marks.uDead[q] === 1 || reached[q] === 1) return;
          reached[q] = 1;
          queue.push(q);
        };
        go(i + 1, j, marks.yBlocked[j * (nx + 1) + i + 1] === 1);
        go(i - 1, j, marks.yBlocked[j * (nx + 1) + i] === 1);
        go(i, j + 1, marks.xBlocked[(j + 1) * nx + i] === 1);
        go(i, j - 1, marks.xBlocked[j * nx + i] === 1);
      }
      const lastColumn = [...Array(grid.y.count).keys()].some((j) => reached[j * nx + nx - 1] === 1);
      expect(reached.reduce((a, b) => a + b, 0)).toBeGreaterThan(20);
      expect(lastColumn).toBe(false);
    }
  });
});
