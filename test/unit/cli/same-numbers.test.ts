// Owns the fact that a job's numbers do not depend on how fast the machine is.
// Must not know how a session divides its time.
import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { parseJob } from '../../../src/model/parse-job.ts';
import type { RunRecord } from '../../../workers/protocol.ts';
import { runToEnd } from '../../../workers/run-to-end.ts';
import { makeSession } from '../../../workers/session.ts';

const kernel = new WebAssembly.Module(readFileSync('workers/kernel/kernel.wasm'));

/** A run on a machine whose clock moves by `milliseconds` at every look, so that slices of work differ in length. */
async function runOnMachine(milliseconds: number): Promise<RunRecord> {
  const job = parseJob(readFileSync('public/examples/bent-rod.json', 'utf8'));
  if (!job.ok) throw new Error(job.errors[0].message);
  let time = 0;
  const session = makeSession({
    pool: null,
    loadKernel: () => Promise.resolve(kernel),
    yieldTurn: () => new Promise((resolve) => setImmediate(resolve)),
    now: () => (time += milliseconds),
  });
  const record = await runToEnd(session, job.value, 'main');
  if (!record.ok) throw new Error(record.errors[0].message);
  return record.value;
}

/** Every sample and every spectral value, in order. */
function numbersOf({ traces, spectra }: RunRecord): number[] {
  return [
    ...traces.flatMap(({ samples }) => samples.flatMap((channel) => [...channel])),
    ...spectra.flatMap(({ components }) => components.flatMap(({ re, im }) => [...re, ...im])),
  ];
}

function firstDifference(a: readonly number[], b: readonly number[]): { at: number; a: number; b: number } | null {
  const at = a.findIndex((value, k) => !Object.is(value, b[k]));
  return at < 0 ? null : { at, a: a[at] ?? Number.NaN, b: b[at] ?? Number.NaN };
}

test('a run that ends by decay has the same samples and spectra on a fast machine and on a slow one', async () => {
  const [fast, slow] = [await runOnMachine(0.1), await runOnMachine(5)];
  expect(slow.stopReason).toBe('decayed');
  expect(slow.steps).toBe(fast.steps);
  expect(numbersOf(slow).length).toBeGreaterThan(10_000);
  expect(firstDifference(numbersOf(slow), numbersOf(fast))).toBeNull();
  expect(slow.energyDb).toBe(fast.energyDb);
});
