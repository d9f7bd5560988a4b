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
    loadKernel: () => Promise.resolve(kernel),
    yieldTurn: () => new Promise((resolve) => setImmediate(resolve)),
    now: () => (time += milliseconds),
  });
  const record = await runToEnd(session, job.value, 'main');
  if (!record.ok) throw new Error(record.errors[0].message);
  return record.value;
}

test('a run that ends by decay has the same samples and spectra on a fast machine and on a slow one', async () => {
  const [fast, slow] = [await runOnMachine(0.1), await runOnMachine(5)];
  expect(slow.stopReason).toBe('decayed');
  expect(slow.steps).toBe(fast.steps);
  expect(slow.traces).toEqual(fast.traces);
  expect(slow.spectra).toEqual(fast.spectra);
  expect(slow.energyDb).toBe(fast.energyDb);
});
