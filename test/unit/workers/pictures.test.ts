// Rows of pictures sampled by the kernel against the plain loops.
import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { sampleField, type FrameQuantity } from '../../../src/engine/frame.ts';
import { makePlan } from '../../../src/engine/plan.ts';
import type { Section } from '../../../src/model/job.ts';
import { openRun } from '../../../workers/run.ts';
import { resolvedJob } from '../../helpers/resolved-jobs.ts';

const kernel = new WebAssembly.Module(readFileSync(new URL('../../../workers/kernel/kernel.wasm', import.meta.url)));
const QUANTITIES: readonly FrameQuantity[] = ['u', 'x', 'y', 'u magnitude', 'in-plane magnitude'];

describe('a picture sampled by the kernel', () => {
  for (const section of ['E out of plane', 'H out of plane'] satisfies Section[]) {
    test.each(QUANTITIES)(`is that of the plain loops: %s, ${section}`, (quantity) => {
      const plan = makePlan(resolvedJob({ section }), 'main');
      if (!plan.ok) throw new Error(plan.errors[0].message);
      const run = openRun(plan.value, kernel);
      if (!run.ok) throw new Error(run.errors[0].message);
      run.value.advance(150);
      const { image, rows } = run.value;
      const sample = (by: typeof rows | null) => sampleField(image, plan.value.fields, section, quantity, 4000, 4000, by);
      const [fast, plain] = [sample(rows), sample(null)];
      expect([fast.width, fast.height]).toEqual([plain.width, plain.height]);
      expect(plain.peak).toBeGreaterThan(0);
      const apart = fast.values.reduce((most, value, k) => Math.max(most, Math.abs(value - plain.values[k]!)), 0);
      expect(apart / plain.peak).toBeLessThan(1e-6);
      expect(fast.peak / plain.peak).toBeCloseTo(1, 5);
    });
  }
});
