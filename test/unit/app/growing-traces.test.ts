import { expect, test } from 'vitest';
import { GrowingTraces } from '../../../src/app/growing-traces.ts';

function report(probeId: string, sinceStep: number, values: readonly number[]) {
  const samples = () => Float32Array.from(values);
  return { sinceStep, traces: [{ probeId, samples: [samples(), samples(), samples()] as const }] };
}

const valid = (growing: GrowingTraces): number[] => [...(growing.traces[0]?.samples[2] ?? [])].slice(0, growing.count);

test('reports join without a gap, whatever their length', () => {
  const growing = new GrowingTraces();
  const all = Array.from({ length: 20000 }, (_, n) => n);
  for (let at = 0; at < all.length; at += 777) growing.append(report('p', at, all.slice(at, at + 777)));
  expect(valid(growing)).toEqual(all);
});

test('the list of traces is a new one only when buffers have moved', () => {
  const growing = new GrowingTraces();
  growing.append(report('p', 0, [1, 2]));
  const before = growing.traces;
  growing.append(report('p', 2, [3]));
  expect(growing.traces).toBe(before);
  growing.append(
    report(
      'p',
      3,
      Array.from({ length: 5000 }, () => 0),
    ),
  );
  expect(growing.traces).not.toBe(before);
});

test('a report from the start replaces what was there', () => {
  const growing = new GrowingTraces();
  growing.append(report('p', 0, [1, 2, 3]));
  growing.append(report('p', 0, [9]));
  expect(valid(growing)).toEqual([9]);
});
