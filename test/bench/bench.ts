// Owns `npm run bench`: throughput and start-up as ratios measured side by side in one run, as a table and as JSON.
// `--native` adds a textbook C version, compiled on the spot, when a C compiler is there.
import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { availableParallelism, cpus } from 'node:os';
import { BLOCK_STEPS } from '../../src/engine/feasible.ts';
import { MOST_THREADS } from '../../src/engine/layout.ts';
import { makePlan } from '../../src/engine/plan.ts';
import type { ResolvedJob } from '../../src/model/job.ts';
import { openRun, type Run } from '../../workers/run.ts';
import { makeThreadPool } from '../../workers/thread-pool.node.ts';
import { benchJob, diagonalPart } from './bench-jobs.ts';
import { watchedRate } from './live-view.ts';
import { measureNative } from './native.ts';
import { makePlainSheet, stepPlainSheet } from './plain-update.ts';

interface Row {
  readonly name: string;
  readonly value: number;
  readonly unit: string;
  /** Ratio to the row it is compared with, if any. */
  readonly ratio: number | null;
  readonly against: string;
}

const [kernel, sharedKernel] = await Promise.all(
  ['kernel', 'kernel-shared'].map((name) =>
    WebAssembly.compile(readFileSync(new URL(`../../workers/kernel/${name}.wasm`, import.meta.url))),
  ),
);
const pool = makeThreadPool();
const threads = Math.min(MOST_THREADS, availableParallelism());
const rows: Row[] = [];

function add(name: string, value: number, unit: string, against: Row | null): Row {
  const row = { name, value, unit, ratio: against === null ? null : value / against.value, against: against?.name ?? '' };
  rows.push(row);
  return row;
}

async function open(job: ResolvedJob, many = 1): Promise<Run> {
  const plan = makePlan(job, 'main', many);
  if (!plan.ok) throw new Error(plan.errors[0].message);
  const run = plan.value.threads > 1 ? openRun(plan.value, sharedKernel!, pool) : openRun(plan.value, kernel!);
  if (!run.ok) throw new Error(run.errors[0].message);
  while (run.value.threads < plan.value.threads) await new Promise((resolve) => setTimeout(resolve, 5));
  return run.value;
}

/** Best of several stretches, Mcell/s: the machine's other work only ever slows a stretch down. */
function bestRate(cells: number, step: (steps: number) => void): number {
  // Whole blocks for every thread.
  const whole = BLOCK_STEPS * threads;
  const steps = whole * Math.max(1, Math.round(1.5e8 / cells / whole));
  step(steps);
  let best = 0;
  for (let k = 0; k < 6; k++) {
    const start = performance.now();
    step(steps);
    best = Math.max(best, (cells * steps) / (performance.now() - start) / 1000);
  }
  return best;
}

async function kernelRate(job: ResolvedJob, many = 1): Promise<number> {
  const run = await open(job, many);
  const advance = (steps: number): void => {
    for (let left = steps; left > 0; left -= run.plan.slice) run.advance(Math.min(left, run.plan.slice));
  };
  const rate = bestRate(run.plan.estimate.cellsTotal, advance);
  run.close();
  return rate;
}

const n = 1024;
const open1000 = { cellsX: n - 24, cellsY: n - 24 };
const sheet = makePlainSheet(n);
const plain = add(
  `plain TypeScript, ${n} x ${n}, no absorber`,
  bestRate(n * n, (steps) => {
    for (let s = 0; s < steps; s++) stepPlainSheet(sheet);
  }),
  'Mcell/s',
  null,
);
const bare = add(`one thread, CPML on four sides, ${n} x ${n}`, await kernelRate(benchJob(open1000)), 'Mcell/s', plain);
for (const section of ['E out of plane', 'H out of plane'] as const) {
  const parts = [diagonalPart({ cells: n - 24, share: 1, medium: {} })];
  add(`every row mixed, ${section}`, await kernelRate(benchJob({ ...open1000, section, parts })), 'Mcell/s', bare);
}
const third = [diagonalPart({ cells: n - 24, share: 0.3, medium: { sigma: 0.02 } })];
add(
  '30 % mixed lossy rows, 4 probes, 201 frequencies',
  await kernelRate(benchJob({ ...open1000, parts: third, probes: 4, points: 201 })),
  'Mcell/s',
  bare,
);
for (const size of [256, 512, 2048, 4096]) {
  add(`one thread, ${size} x ${size}`, await kernelRate(benchJob({ cellsX: size - 24, cellsY: size - 24 })), 'Mcell/s', bare);
}

if (threads > 1) {
  for (const size of [1024, 4096]) {
    const name = `${size} x ${size}`;
    const alone = rows.find((row) => row.name.startsWith('one thread') && row.name.endsWith(name))!;
    const rate = await kernelRate(benchJob({ cellsX: size - 24, cellsY: size - 24 }), threads);
    add(`${threads} threads, ${name}`, rate, 'Mcell/s', alone);
  }
}

const startJob = benchJob({ cellsX: 488, cellsY: 488, parts: [diagonalPart({ cells: 488, share: 0.3, medium: {} })] });
let started = Infinity;
for (let k = 0; k < 4; k++) {
  const start = performance.now();
  (await open(startJob)).advance(1);
  started = Math.min(started, performance.now() - start);
}
add('job to first step, 512 x 512, 30 % mixed', started, 'ms', null);

let small = Infinity;
for (let k = 0; k < 4; k++) {
  const start = performance.now();
  const run = await open(benchJob({ cellsX: 176, cellsY: 76, points: 201 }));
  for (let left = 4000; left > 0; left -= run.plan.slice) run.advance(Math.min(left, run.plan.slice));
  run.spectrum(0);
  small = Math.min(small, performance.now() - start);
}
add('200 x 100 cells, 4000 steps, spectrum of 201, end to end', small, 'ms', null);

const unwatched = add('session, 1024 x 1024, unwatched', await watchedRate(0), 'Mcell/s', null);
add('session, 30 frames a second of 1600 x 900', await watchedRate(30), 'Mcell/s', unwatched);

if (process.argv.includes('--native')) {
  for (const size of [1024, 4096]) {
    for (const many of new Set([1, threads])) {
      const words = many === 1 ? 'one thread' : `${many} threads`;
      const rate = measureNative(size, many);
      if (rate === null) {
        console.log('No C compiler with OpenMP here: a native row is left out.');
        continue;
      }
      const native = add(`textbook C, ${words}, ${size} x ${size}`, rate, 'Mcell/s', null);
      const own = rows.find((row) => row.name.startsWith(words) && row.name.endsWith(`${size} x ${size}`));
      if (own !== undefined) add(`${words}, ${size} x ${size}, against C`, own.value, 'Mcell/s', native);
    }
  }
}

const widest = Math.max(...rows.map((row) => row.name.length));
for (const row of rows) {
  const ratio = row.ratio === null ? '' : `${row.ratio.toFixed(2)} x ${row.against}`;
  console.log(
    `${row.name.padEnd(widest)}  ${row.value.toFixed(row.unit === 'ms' ? 1 : 0).padStart(7)} ${row.unit.padEnd(8)} ${ratio}`,
  );
}
mkdirSync('test-results', { recursive: true });
writeFileSync(
  'test-results/bench.json',
  `${JSON.stringify({ machine: cpus()[0]?.model ?? '', node: process.version, rows }, null, 2)}\n`,
);
console.log('written to test-results/bench.json');
