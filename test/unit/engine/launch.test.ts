import { describe, expect, test } from 'vitest';
import { makeGrid } from '../../../src/engine/grid.ts';
import { makePlan } from '../../../src/engine/plan.ts';
import { chooseLaunch, type Launch } from '../../../src/engine/plane-wave.ts';
import type { Result } from '../../../src/base/result.ts';
import type { ResolvedDrive, ResolvedJob } from '../../../src/model/job.ts';
import { AIR, edges, METAL, part, rectangle, resolvedJob } from '../../helpers/resolved-jobs.ts';

function launchOf(degrees: number, change: Partial<ResolvedJob>): Result<Launch> {
  const drive: Extract<ResolvedDrive, { kind: 'plane wave' }> = {
    id: 'wave',
    name: 'Wave',
    kind: 'plane wave',
    amplitude: 1,
    angleRadians: (degrees * Math.PI) / 180,
    waveform: { kind: 'band pulse' },
  };
  const job = resolvedJob({ ...change, drives: [drive] });
  const grid = makeGrid(job);
  if (!grid.ok) throw new Error(grid.errors[0].message);
  return chooseLaunch(job, grid.value, drive);
}

function refusal(result: Result<Launch>): string {
  return result.ok ? `launched ${result.value.kind}` : `${result.errors[0].message} ${result.errors[0].hint}`;
}

const sheet = resolvedJob().sheet;
const post = part('Post', METAL, rectangle(0.14, 0.09, 0.16, 0.11));
const door = part('Door', METAL, rectangle(0.14, -0.1, 0.142, 0.3));

describe('a plane wave is launched', () => {
  test('through a box round bodies inside four absorbing edges, at any angle', () => {
    const launch = launchOf(37, { parts: [post] });
    expect(launch.ok && launch.value.kind).toBe('box');
  });

  test('over the full height on a screen, between metal edges for H out of plane and magnetic ones for E', () => {
    for (const [section, sides] of [
      ['H out of plane', 'metal'],
      ['E out of plane', 'magnetic'],
    ] as const) {
      const launch = launchOf(0, {
        section,
        parts: [door],
        sheet: { ...sheet, edges: edges('absorbing', 'absorbing', sides, sides) },
      });
      expect(launch.ok && launch.value.kind).toBe('full height');
      expect(launch.ok && launch.value.faces).toEqual(['left']);
    }
  });

  test('from any side, by its direction of travel', () => {
    const faces = [0, 90, 180, 270, 450, -90].map((degrees) => {
      const along = degrees % 180 === 0;
      const screen = part('Screen', METAL, along ? rectangle(0.14, -1, 0.15, 1) : rectangle(-1, 0.1, 1, 0.11));
      const sides = along
        ? edges('absorbing', 'absorbing', 'repeating', 'repeating')
        : edges('repeating', 'repeating', 'absorbing', 'absorbing');
      const launch = launchOf(degrees, { parts: [screen], sheet: { ...sheet, edges: sides } });
      return launch.ok ? launch.value.faces[0] : refusal(launch);
    });
    expect(faces).toEqual(['left', 'bottom', 'right', 'top', 'bottom', 'top']);
  });
});

describe('a plane wave is refused with the reason and the mend', () => {
  test('a screen that reaches absorbing edges', () => {
    expect(refusal(launchOf(0, { parts: [door] }))).toMatch(
      /Door reaches the sheet's edge.*needs magnetic.*Make the bottom and top edges magnetic/,
    );
  });

  test('a screen at an angle', () => {
    expect(refusal(launchOf(20, { parts: [door] }))).toMatch(
      /at an angle can only be launched round bodies.*0, 90, 180 or 270 deg/,
    );
  });

  test('a closed entering edge', () => {
    const closed = { ...sheet, edges: edges('metal', 'absorbing', 'metal', 'metal') };
    expect(refusal(launchOf(0, { section: 'H out of plane', parts: [door], sheet: closed }))).toMatch(
      /left edge, which is metal.*Make the left edge absorbing/,
    );
  });

  test('a part where the wave is launched', () => {
    const near = part('Near', { ...AIR, epsilonRelative: 3 }, rectangle(0, 0, 0.05, 0.2));
    const between = { ...sheet, edges: edges('absorbing', 'absorbing', 'magnetic', 'magnetic') };
    expect(refusal(launchOf(0, { parts: [near], sheet: between }))).toMatch(
      /Near stands where the wave is launched.*Leave at least 5 cells/,
    );
  });

  test('a lossy background', () => {
    expect(refusal(launchOf(0, { sheet: { ...sheet, background: { ...AIR, sigma: 0.1 } } }))).toMatch(/lossless background/);
  });
});

describe('a job is refused', () => {
  test('without a drive', () => {
    const plan = makePlan(resolvedJob({ drives: [] }), 'main');
    expect(plan.ok ? null : plan.errors[0].code).toBe('no drive');
  });

  test('with a line current inside metal', () => {
    const plan = makePlan(resolvedJob({ parts: [part('Block', METAL, rectangle(0.05, 0.05, 0.15, 0.15))] }), 'main');
    expect(plan.ok ? null : plan.errors[0].message).toMatch(/Drive stands in metal/);
  });

  test('over the memory limit, with the numbers', () => {
    const plan = makePlan(
      resolvedJob({ grid: { cells: { xMetres: 1e-5, yMetres: 1e-5 }, absorberCells: 10, courant: 0.99 } }),
      'main',
    );
    expect(plan.ok ? null : plan.errors[0].message).toMatch(/needs \d+ MB for 30019 by 20019 cells; the limit is 1792 MB/);
  });
});

test('the reference plan keeps the grid and the launch of the main one', () => {
  const job = resolvedJob({
    section: 'H out of plane',
    parts: [door],
    sheet: { ...sheet, edges: edges('absorbing', 'absorbing', 'metal', 'metal') },
  });
  const main = makePlan(job, 'main');
  const reference = makePlan(job, 'reference');
  if (!main.ok || !reference.ok) throw new Error('no plan');
  expect(reference.value.estimate.cellsX).toBe(main.value.estimate.cellsX);
  expect(reference.value.dtSeconds).toBe(main.value.dtSeconds);
  expect(reference.value.fixed.byteLength).toBeLessThan(main.value.fixed.byteLength);
});
