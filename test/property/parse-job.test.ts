import fc from 'fast-check';
import { describe, expect, it, vi } from 'vitest';
import type { Result } from '../../src/base/result.ts';
import type { Job } from '../../src/model/job.ts';
import { parseJob } from '../../src/model/parse-job.ts';
import { resolveJob } from '../../src/model/resolve-job.ts';
import { serialiseJob } from '../../src/model/serialise-job.ts';
import { makeFullJob } from '../fixtures/full-job.ts';

// Hundreds of cases each; a busy machine may need longer than a plain test may take.
vi.setConfig({ testTimeout: 60_000 });

/** Whole or not at all: an accepted job survives its own text, resolves or says why not; a refusal always has a mend. */
function expectSound(result: Result<Job>): void {
  if (!result.ok) {
    for (const error of result.errors) {
      expect(error.message.length).toBeGreaterThan(0);
      expect(error.message.length).toBeLessThan(600);
      expect(error.hint).toBeTruthy();
    }
    return;
  }
  expect(parseJob(serialiseJob(result.value))).toEqual(result);
  const resolved = resolveJob(result.value);
  if (!resolved.ok) expect(resolved.errors[0].hint).toBeTruthy();
}

type Json = null | boolean | number | string | Json[] | { [key: string]: Json };

/** Every place in a document, as paths. */
function listPaths(value: Json, path: readonly (string | number)[] = []): (readonly (string | number)[])[] {
  if (typeof value !== 'object' || value === null) return [path];
  const inner = Array.isArray(value) ? [...value.entries()] : Object.entries(value);
  return [path, ...inner.flatMap(([key, item]) => listPaths(item, [...path, key]))];
}

function mutate(root: Json, path: readonly (string | number)[], change: (value: Json) => Json | undefined): Json {
  const [step, ...rest] = path;
  if (step === undefined) return change(root) ?? null;
  if (typeof root !== 'object' || root === null) return root;
  if (Array.isArray(root)) return root.map((item, k) => (k === step ? mutate(item, rest, change) : item));
  const copy: { [key: string]: Json } = { ...root };
  const old = copy[step];
  if (old === undefined) return copy;
  if (rest.length > 0) copy[step] = mutate(old, rest, change);
  else {
    const changed = change(old);
    if (changed === undefined) delete copy[step];
    else copy[step] = changed;
  }
  return copy;
}

const VALID = JSON.parse(serialiseJob(makeFullJob())) as Json;
const PATHS = listPaths(VALID);
const VALID_TEXT = serialiseJob(makeFullJob());

const strangeValues = fc.oneof(
  fc.constantFrom<Json>(
    null,
    '',
    '0',
    '-3 mm',
    '3 GHz',
    '1e300 m',
    '2,5 mm',
    'a',
    'nothing',
    'never',
    0,
    -1,
    1e308,
    0.5,
    [],
    {},
    true,
  ),
  fc.jsonValue().map((value) => value as Json),
);

describe('loading a job', () => {
  it('survives any JSON value', () => {
    fc.assert(
      fc.property(fc.jsonValue({ maxDepth: 6 }), (value) => expectSound(parseJob(value))),
      { numRuns: 300 },
    );
  });

  it('survives any JavaScript value', () => {
    const values = fc.anything({
      withBigInt: true,
      withDate: true,
      withMap: true,
      withSet: true,
      withTypedArray: true,
      withNullPrototype: true,
      withSparseArray: true,
    });
    fc.assert(
      fc.property(values, (value) => expectSound(parseJob({ guidewall: 1, parts: value, sheet: value, band: value }))),
      { numRuns: 300 },
    );
    fc.assert(
      fc.property(values, (value) => expectSound(parseJob(value))),
      { numRuns: 300 },
    );
  });

  it('survives a valid job with strange values anywhere, whole or refused', () => {
    const change = fc.tuple(fc.constantFrom(...PATHS), fc.oneof(strangeValues, fc.constant(undefined)));
    fc.assert(
      fc.property(fc.array(change, { minLength: 1, maxLength: 3 }), (changes) => {
        const mutated = changes.reduce((document, [path, value]) => mutate(document, path, () => value), VALID);
        expectSound(parseJob(mutated));
      }),
      { numRuns: 700 },
    );
  });

  it('survives text cut off or with characters exchanged anywhere', () => {
    fc.assert(
      fc.property(fc.nat(VALID_TEXT.length - 1), fc.nat(20), fc.string({ maxLength: 4 }), (at, length, inserted) => {
        expectSound(parseJob(VALID_TEXT.slice(0, at)));
        expectSound(parseJob(VALID_TEXT.slice(0, at) + inserted + VALID_TEXT.slice(at + length)));
      }),
      { numRuns: 300 },
    );
  });

  it('survives any text', () => {
    fc.assert(fc.property(fc.string({ unit: 'binary', maxLength: 200 }), (text) => expectSound(parseJob(text))));
  });

  it('refuses nesting, however deep, without running out of stack', () => {
    for (const depth of [20, 1000, 200_000]) {
      expect(parseJob(`{"guidewall":1,"notes":${'['.repeat(depth)}${']'.repeat(depth)}}`).ok).toBe(false);
    }
    let nested: unknown = 'end';
    for (let k = 0; k < 100_000; k += 1) nested = { parts: nested };
    expect(parseJob(nested).ok).toBe(false);
  });

  it('refuses an object that contains itself or throws when read', () => {
    const circle: Record<string, unknown> = { guidewall: 1 };
    circle['parts'] = circle;
    expect(parseJob(circle).ok).toBe(false);
    const trap = {
      get guidewall(): number {
        throw new Error('trap');
      },
    };
    expect(parseJob(trap).ok).toBe(false);
  });
});
