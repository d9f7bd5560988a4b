import { expect, test } from 'vitest';
import { renameInExpression } from '../../../src/base/expression.ts';

test.each([
  ['a/2 + 3 mm', 'broad/2 + 3 mm'],
  ['a', 'broad'],
  ['-a*(a - 1 mm)', '-broad*(broad - 1 mm)'],
  ['max(a, b)', 'max(broad, b)'],
  ['ab + a2', 'ab + a2'],
])('in "%s" the name a becomes broad: "%s"', (text, renamed) => {
  expect(renameInExpression(text, 'a', 'broad')).toBe(renamed);
});

test('a unit of the same letters is left alone', () => {
  expect(renameInExpression('3 m + m', 'm', 'span')).toBe('3 m + span');
  expect(renameInExpression('(1 + 2) m', 'm', 'span')).toBe('(1 + 2) m');
});

test('a text that does not read is given back as it is', () => {
  expect(renameInExpression('a ? b', 'a', 'broad')).toBe('a ? b');
});
