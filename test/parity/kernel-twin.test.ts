// The WebAssembly kernel against its TypeScript twin: equal bits over the whole image, whatever the row holds.
import { readFileSync } from 'node:fs';
import { beforeAll, expect, test } from 'vitest';
import * as L from '../../src/engine/layout.ts';
import { makePlan, type RunPlan } from '../../src/engine/plan.ts';
import { advanceImage } from '../../src/engine/stepper.ts';
import type { ResolvedJob, Section } from '../../src/model/job.ts';
import { openRun } from '../../workers/run.ts';
import { AIR, edges, METAL, part, rectangle, regularPolygon, resolvedJob } from '../helpers/resolved-jobs.ts';

let kernel: WebAssembly.Module;
beforeAll(async () => {
  kernel = await WebAssembly.compile(readFileSync(new URL('../../workers/kernel/kernel.wasm', import.meta.url)));
});

/** The image begins one page into the kernel's memory. */
const BASE = 65536;
const STEPS = 60;

/**
 * Words that differ between kernel and twin after two slices of the job, and words that are not zero. Blocks of several
 * steps leave earlier levels of an incident line in the image, so there the fields and the record are compared.
 */
async function differences(job: ResolvedJob, block: number): Promise<{ differ: number; live: number }> {
  const plan = makePlan(job, 'main');
  if (!plan.ok) throw new Error(plan.errors[0].message);
  plan.value.header[L.H_BLOCK] = block;
  const opened = openRun(plan.value, kernel);
  if (!opened.ok) throw new Error(opened.errors[0].message);
  const run = opened.value;
  const { header, fixed, fixedOffset, imageBytes, sourceTableOffset, slice, sources, feeds, fields, recordOffset } = plan.value;
  const words = Math.ceil(imageBytes / 16) * 4;
  const twin = new ArrayBuffer(4 * words);
  new Int32Array(twin).set(header);
  new Uint8Array(twin).set(new Uint8Array(fixed), fixedOffset);
  const memory = new Uint8Array(run.image.buffer, BASE, imageBytes);
  let differ = 0;
  let live = 0;
  for (let slices = 0; slices < 2; slices++) {
    run.advance(STEPS);
    // The tables of the drives are filled from outside the kernel: the twin is given the same ones.
    const copy = (at: number, bytes: number): void => new Uint8Array(twin).set(memory.subarray(at, at + bytes), at);
    copy(sourceTableOffset, 8 * slice * sources.length);
    for (const feed of feeds) copy(feed.tableOffset, 8 * slice * feed.fed);
    advanceImage(twin, STEPS);
    const ours = new Int32Array(run.image.buffer, BASE, imageBytes >> 2);
    const theirs = new Int32Array(twin);
    const from = block === 1 ? 0 : fields.uOffset >> 2;
    const to = block === 1 ? ours.length : (recordOffset >> 2) + STEPS * 3;
    for (let k = from; k < to; k++) {
      if (ours[k] !== theirs[k]) differ++;
      if (ours[k] !== 0) live++;
    }
  }
  return { differ, live };
}

const disc = part(
  'disc',
  { ...AIR, epsilonRelative: 4, muRelative: 1.5, sigma: 0.05, sigmaMagnetic: 20 },
  regularPolygon([0.2, 0.1], 0.04, 60),
);
const glass = part('glass', { ...AIR, epsilonRelative: 4 }, regularPolygon([0.2, 0.1], 0.04, 60));
const oblong = { ...resolvedJob().grid, cells: { xMetres: 0.004, yMetres: 0.005 } };
const wall = part('wall', METAL, rectangle(0.05, 0, 0.055, 0.08));
const cases: Record<string, Partial<ResolvedJob>> = {
  'an open sheet': {},
  'an open sheet of oblong cells': { grid: oblong },
  'lossless dielectric': { parts: [glass] },
  'lossless dielectric on oblong cells': { parts: [glass], grid: oblong },
  'a metal disc': { parts: [part('disc', METAL, regularPolygon([0.2, 0.1], 0.04, 60))] },
  'lossy dielectric and metal': { parts: [disc, wall] },
  'parts that run into the absorber': {
    parts: [part('block', { ...AIR, epsilonRelative: 3, sigma: 0.01 }, rectangle(0.1, -0.1, 0.4, 0.05))],
  },
  'repeating edges': { sheet: { ...resolvedJob().sheet, edges: edges('repeating') } },
  'magnetic and metal edges': { sheet: { ...resolvedJob().sheet, edges: edges('magnetic', 'metal', 'metal', 'magnetic') } },
  'a plane wave at an angle': {
    drives: [{ id: 'wave', name: 'Wave', kind: 'plane wave', amplitude: 1, angleRadians: 0.5, waveform: { kind: 'band pulse' } }],
  },
};

for (const section of ['E out of plane', 'H out of plane'] satisfies Section[]) {
  for (const [name, change] of Object.entries(cases)) {
    for (const block of name === 'repeating edges' ? [1] : [1, 3, 8]) {
      test(`kernel and twin agree bit for bit in blocks of ${block}: ${section}, ${name}`, async () => {
        const { differ, live } = await differences(resolvedJob({ section, ...change }), block);
        expect(live).toBeGreaterThan(1000);
        expect(differ).toBe(0);
      });
    }
  }
}

/** Kinds of span in a plan, with the flag of worked ones; plain ones also by whether their links have b = 1. */
function kindsOf({ header, fixed, fixedOffset }: RunPlan): string[] {
  const words = new Int32Array(fixed);
  const singles = new Float32Array(fixed);
  const wordAt = (offset: number): number => (offset - fixedOffset) >> 2;
  const table = wordAt(header[L.H_ROW_TABLE]!);
  const kinds: string[] = [];
  for (let row = 1; row <= header[L.H_ROWS]!; row++) {
    const program = wordAt(words[table + row]!);
    for (let n = 0; n < words[program]!; n++) {
      const span = program + 1 + n * L.SPAN_WORDS;
      const unit = singles[span + L.SPAN_BVX] === 1 && singles[span + L.SPAN_BVY] === 1;
      const kind = words[span + L.SPAN_KIND]!;
      kinds.push(`${kind}${kind === L.PLAIN || kind === L.NODES ? ` ${unit}` : ''}`);
    }
  }
  return kinds;
}

test('the cases hold every kind of span', () => {
  const found = new Set<string>();
  for (const section of ['E out of plane', 'H out of plane'] satisfies Section[]) {
    for (const change of Object.values(cases)) {
      const plan = makePlan(resolvedJob({ section, ...change }), 'main');
      if (plan.ok) for (const kind of kindsOf(plan.value)) found.add(kind);
    }
  }
  const scalarLinks = [L.PLAIN, L.NODES].flatMap((kind) => [`${kind} false`, `${kind} true`]);
  const worked = [L.LOSSLESS, L.LOSSY].map((kind) => String(kind | L.WORKED));
  expect([...found].sort()).toEqual([...scalarLinks, ...[L.LINKS, L.LOSSLESS, L.LOSSY].map(String), ...worked].sort());
});
