import { expect, test } from 'vitest';
import { makeSpin, spinSteps, spinText } from '../../../../src/ui/brief/spin.ts';

function spin(
  text: string,
  steps: number,
  dimension: 'length' | 'frequency' | 'number' | 'decibel' = 'length',
  values = {},
): string {
  const spinning = makeSpin(text, dimension, values);
  return spinning === null ? expect.fail(`${text} cannot be spun`) : spinText(text, dimension, spinning, steps);
}

test.each([
  ['22.86 mm', 1, '23.86 mm'],
  ['180 mm', -1, '170 mm'],
  ['3 mm', 1, '3.1 mm'],
  ['0.9 in', -1, '0.89 in'],
  ['0 mm', -1, '-1 mm'],
  ['0', 1, '1'],
  ['3 mm', 0.1, '3.01 mm'],
])('%s spun by %s is %s', (text, steps, spun) => {
  expect(spin(text, steps)).toBe(spun);
});

test('the unit stays as written', () => {
  expect(spin('8.2 GHz', 1, 'frequency')).toBe('8.3 GHz');
  expect(spin('60 dB', -1, 'decibel')).toBe('59 dB');
  expect(spin('20', 1, 'number')).toBe('21');
});

test('an expression gets a term, and spinning back takes it away', () => {
  const values = { a: '20 mm' };
  const begun = makeSpin('a/2', 'length', values);
  const up = begun === null ? '' : spinText('a/2', 'length', begun, 1);
  expect(up).toBe('a/2 + 1 mm');
  expect(begun === null ? '' : spinText(up, 'length', begun, -1)).toBe('a/2');
});

test('ten down and ten up is where one began, over a power of ten', () => {
  const begun = makeSpin('10 mm', 'length', {});
  let text = '10 mm';
  for (let k = 0; k < 20; k += 1) text = begun === null ? '' : spinText(text, 'length', begun, k < 10 ? -1 : 1);
  expect(text).toBe('10 mm');
});

test('what cannot be read cannot be spun', () => {
  expect(makeSpin('three mm', 'length', {})).toBeNull();
});

test('Shift takes ten steps and Alt a tenth', () => {
  expect(spinSteps({ key: 'ArrowUp', shiftKey: true, altKey: false })).toBe(10);
  expect(spinSteps({ key: 'ArrowDown', shiftKey: false, altKey: true })).toBe(-0.1);
  expect(spinSteps({ key: 'a', shiftKey: false, altKey: false })).toBe(0);
});
