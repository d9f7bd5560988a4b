// One thread against several on the same shared memory: equal bits in fields and records, whatever the row holds.
import { readFileSync } from 'node:fs';
import { afterEach, describe, expect, test, vi } from 'vitest';
import { makePlan } from '../../src/engine/plan.ts';
import type { ResolvedJob } from '../../src/model/job.ts';
import { openRun, type Run } from '../../workers/run.ts';
import { makeThreadPool } from '../../workers/thread-pool.node.ts';
import { AIR, edges, METAL, part, rectangle, regularPolygon, resolvedJob } from '../helpers/resolved-jobs.ts';

// Threads may take their time to start on a busy machine.
vi.setConfig({ testTimeout: 60_000 });

const kernels = { single: new WebAssembly.Module(read('kernel')), shared: new WebAssembly.Module(read('kernel-shared')) };

function read(name: string): Uint8Array<ArrayBuffer> {
  return new Uint8Array(readFileSync(new URL(`../../workers/kernel/${name}.wasm`, import.meta.url)));
}

const pool = makeThreadPool();
const opened: Run[] = [];
afterEach(() => opened.splice(0).forEach((run) => run.close()));

async function open(job: ResolvedJob, threads: number): Promise<Run> {
  const plan = makePlan(job, 'main', threads);
  if (!plan.ok) throw new Error(plan.errors[0].message);
  const shared = plan.value.threads > 1;
  const run = openRun(plan.value, shared ? kernels.shared : kernels.single, shared ? pool : null);
  if (!run.ok) throw new Error(run.errors[0].message);
  opened.push(run.value);
  return run.value;
}

async function joined(run: Run, threads: number): Promise<void> {
  for (let k = 0; k < 3000 && run.threads < threads; k++) await new Promise((resolve) => setTimeout(resolve, 10));
  expect(run.threads).toBe(threads);
}

/** Words of u, vx, vy and of the last slice's record, as integers. */
function words(run: Run): Int32Array {
  const { fields, recordOffset, slice, probeIds } = run.plan;
  const all = new Int32Array(run.image.buffer, run.image.byteOffset, run.image.length);
  const field = (offset: number): Int32Array => all.subarray(offset >> 2, (offset >> 2) + fields.rows * fields.stride);
  const record = all.subarray(recordOffset >> 2, (recordOffset >> 2) + 3 * slice * probeIds.length);
  const parts = [field(fields.uOffset), field(fields.vxOffset), field(fields.vyOffset), record];
  const out = new Int32Array(parts.reduce((sum, part) => sum + part.length, 0));
  parts.reduce((at, part) => (out.set(part, at), at + part.length), 0);
  return out;
}

function differences(a: Run, b: Run): { differ: number; live: number } {
  const [ours, theirs] = [words(a), words(b)];
  let differ = 0;
  let live = 0;
  for (let k = 0; k < ours.length; k++) {
    if (ours[k] !== theirs[k]) differ++;
    if (ours[k] !== 0) live++;
  }
  return { differ, live };
}

// Whole blocks, parts of blocks, single steps, and a number of blocks that is no multiple of the threads.
const SLICES = [16, 1, 7, 60, 256, 3, 40];

const glass = part('glass', { ...AIR, epsilonRelative: 4, sigma: 0.03 }, regularPolygon([0.2, 0.1], 0.04, 60));
const wall = part('wall', METAL, rectangle(0.05, 0, 0.055, 0.08));
const cases: Record<string, Partial<ResolvedJob>> = {
  'dielectric and metal': { parts: [glass, wall] },
  'two plane waves at angles': {
    drives: [0.5, -2.2].map((angleRadians, k) => ({
      id: `wave ${k}`,
      name: 'Wave',
      kind: 'plane wave',
      amplitude: 1,
      angleRadians,
      waveform: { kind: 'band pulse' },
    })),
  },
  'magnetic and metal edges': {
    sheet: { ...resolvedJob().sheet, edges: edges('magnetic', 'metal', 'metal', 'magnetic') },
    grid: { ...resolvedJob().grid, cells: { xMetres: 0.002, yMetres: 0.002 } },
  },
};

describe('the fields do not depend on the number of threads', () => {
  for (const [name, change] of Object.entries(cases)) {
    test.each([2, 3])(`${name}, %i threads`, async (threads) => {
      const job = resolvedJob({ section: 'H out of plane', ...change });
      const alone = await open(job, 1);
      const several = await open(job, threads);
      await joined(several, threads);
      for (const steps of SLICES) {
        alone.advance(steps);
        several.advance(steps);
        const { differ, live } = differences(alone, several);
        expect(live).toBeGreaterThan(1000);
        expect(differ).toBe(0);
      }
      expect([...several.spectrum(0).re]).toEqual([...alone.spectrum(0).re]);
    });
  }

  test('helpers that come late join between slices', async () => {
    const job = resolvedJob(cases['two plane waves at angles']);
    const alone = await open(job, 1);
    const several = await open(job, 2);
    several.advance(24);
    await joined(several, 2);
    several.advance(100);
    alone.advance(24);
    alone.advance(100);
    expect(differences(alone, several).differ).toBe(0);
  });

  test('a run taken back to t = 0 goes the same way again', async () => {
    const job = resolvedJob(cases['two plane waves at angles']);
    const alone = await open(job, 1);
    const several = await open(job, 2);
    await joined(several, 2);
    several.advance(77);
    several.rewind();
    several.advance(77);
    alone.advance(77);
    expect(differences(alone, several).differ).toBe(0);
  });

  test('rows that close a loop, or are few, are worked on by one thread', async () => {
    const loop = await open(resolvedJob({ sheet: { ...resolvedJob().sheet, edges: edges('repeating') } }), 4);
    expect(loop.plan.threads).toBe(1);
    const few = await open(resolvedJob({ grid: { ...resolvedJob().grid, cells: { xMetres: 0.01, yMetres: 0.01 } } }), 4);
    expect(few.plan.threads).toBe(1);
  });
});
