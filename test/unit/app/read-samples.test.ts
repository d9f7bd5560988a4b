import { expect, test } from 'vitest';
import { readSamples } from '../../../src/app/read-samples.ts';

function read(text: string) {
  const samples = readSamples(text);
  return samples.ok ? samples.value : expect.fail(samples.errors[0].message);
}

test.each([
  ['commas', 't,v\n0,0\n1e-9,1\n2e-9,0.5\n'],
  ['semicolons and decimal commas', 'Zeit;Wert\r\n0;0\r\n1e-9;1\r\n2e-9;0,5\r\n'],
  ['tabs', '0\t0\n1e-9\t1\n2e-9\t0.5'],
  ['spaces', '# note\n0  0\n1e-9 1\n2e-9   .5\n'],
])('samples apart by %s are read', (_, text) => {
  expect(read(text)).toEqual({ times: [0, 1e-9, 2e-9], values: [0, 1, 0.5], beganSeconds: 0 });
});

test('a unit of time in the heading counts', () => {
  expect(read('t (ns),v\n0,0\n2,1\n').times).toEqual([0, 2e-9]);
});

test('a record that begins before its trigger is put at zero', () => {
  const { times, beganSeconds } = read('-1e-9,0\n0,1\n');
  expect(times).toEqual([0, 1e-9]);
  expect(beganSeconds).toBe(-1e-9);
});

test.each([
  ['one sample', '0,1\n', 'at least 2'],
  ['nothing', '', 'at least 2'],
  ['times that fall', '0,1\n1e-9,1\n0.5e-9,1\n', 'Line 3'],
  ['words between the numbers', '0,1\n1e-9,1\nend,of file\n', 'Line 3'],
])('%s are refused with the line', (_, text, words) => {
  const samples = readSamples(text);
  expect(samples.ok ? '' : samples.errors[0].message).toContain(words);
});
