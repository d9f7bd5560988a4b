import { expect, test } from 'vitest';
import type { SplitterSpec } from '../../../../src/ui/shell/Splitter.tsx';
import { keyPixels, moveSize } from '../../../../src/ui/shell/Splitter.tsx';

const SPEC: SplitterSpec = {
  property: '--size',
  label: 'Size',
  direction: 'left and right',
  grows: 'with',
  initial: 300,
  least: 200,
  most: 400,
};

test('a place on the left grows as its line goes right, one on the right shrinks', () => {
  expect(moveSize(300, 40, SPEC)).toBe(340);
  expect(moveSize(300, 40, { ...SPEC, grows: 'against' })).toBe(260);
});

test('a size stays within its bounds', () => {
  expect(moveSize(300, 1000, SPEC)).toBe(400);
  expect(moveSize(300, -1000, SPEC)).toBe(200);
});

test('only the arrows along its way move a line', () => {
  expect(keyPixels('ArrowRight', 'left and right')).toBeGreaterThan(0);
  expect(keyPixels('ArrowUp', 'up and down')).toBeLessThan(0);
  expect(keyPixels('ArrowUp', 'left and right')).toBe(0);
});
