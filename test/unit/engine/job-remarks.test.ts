// What is said of a job that runs but may not do what was meant.
import { expect, test } from 'vitest';
import { makeEstimate } from '../../../src/engine/estimate.ts';
import type { ResolvedJob } from '../../../src/model/job.ts';
import { AIR, METAL, part, rectangle, resolvedJob } from '../../helpers/resolved-jobs.ts';

function saidOf(change: Partial<ResolvedJob>): string[] {
  const estimate = makeEstimate(resolvedJob(change), 500);
  if (!estimate.ok) throw new Error(estimate.errors[0].message);
  return estimate.value.remarks.map(({ code, path }) => `${code}: ${path}`);
}

const band = resolvedJob().band;
const drive = resolvedJob().drives[0]!;

test('a probe in metal is told, and not when something is painted over the metal there', () => {
  const metal = part('block', METAL, rectangle(0.18, 0.09, 0.22, 0.13));
  const hole = part('hole', AIR, rectangle(0.19, 0.1, 0.21, 0.12));
  expect(saidOf({ parts: [metal] })).toEqual(['probe in metal: probe']);
  expect(saidOf({ parts: [metal, hole] })).toEqual([]);
});

test('a part wholly outside the sheet is told, one that reaches in is not', () => {
  expect(saidOf({ parts: [part('far', METAL, rectangle(0.31, 0.05, 0.35, 0.15))] })).toEqual(['part outside: far']);
  expect(saidOf({ parts: [part('near', METAL, rectangle(0.29, 0.05, 0.35, 0.15))] })).toEqual([]);
});

test('a listed frequency outside the band is told, its ends are inside', () => {
  expect(saidOf({ band: { ...band, listedHertz: [1e9, 6e9] } })).toEqual([]);
  expect(saidOf({ band: { ...band, listedHertz: [2e9, 10e9] } })).toEqual(['listed outside band: band.listed']);
});

test('a continuous wave outside the band is told', () => {
  const at = (frequencyHertz: number): Partial<ResolvedJob> => ({
    drives: [{ ...drive, waveform: { kind: 'continuous wave', frequencyHertz } }],
  });
  expect(saidOf(at(3e9))).toEqual([]);
  expect(saidOf(at(20e9))).toEqual(['continuous wave outside band: drive']);
});
