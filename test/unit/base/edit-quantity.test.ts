import { describe, expect, it } from 'vitest';
import { addQuantityTexts, isPlainQuantity, retargetQuantity, shiftQuantity } from '../../../src/base/edit-quantity.ts';

describe('shifting a quantity', () => {
  it.each([
    ['20 mm', 0.003, '23 mm'],
    ['0.9 in', 0.00254, '1 in'],
    ['5µm', 1e-6, '6 µm'],
    ['20 mm', -0.02, '0 mm'],
    ['0.3 m', -0.1, '0.2 m'],
    ['0', 0.003, '3 mm'],
    ['a/2', 0.003, 'a/2 + 3 mm'],
    ['a/2 + 3 mm', 0.001, 'a/2 + 4 mm'],
    ['a/2 + 3 mm', -0.003, 'a/2'],
    ['a/2 + 3 mm', -0.005, 'a/2 - 2 mm'],
    ['a/2 - 2 mm', 0.005, 'a/2 + 3 mm'],
    ['a*(b + 3 mm)', 0.001, 'a*(b + 3 mm) + 1 mm'],
    ['20 mm', 0, '20 mm'],
  ])('turns %s by %s m into %s', (text, delta, expected) => {
    expect(shiftQuantity(text, delta, 'length')).toBe(expected);
  });

  it('leaves no trace of rounding', () => {
    expect(shiftQuantity('0.1 mm', 0.0002, 'length')).toBe('0.3 mm');
    expect(shiftQuantity(shiftQuantity('a', 0.0001, 'length'), -0.0001, 'length')).toBe('a');
  });
});

describe('retargeting a quantity', () => {
  it('keeps the unit of a plain value and the expression of another', () => {
    expect(retargetQuantity('0.9 in', 0.0254, 'length', {})).toBe('1 in');
    expect(retargetQuantity('a/2', 0.012, 'length', { a: '20 mm' })).toBe('a/2 + 2 mm');
    expect(retargetQuantity('30 deg', Math.PI / 4, 'angle', {})).toBe('45 deg');
  });
});

describe('adding texts', () => {
  it.each([
    ['10 mm', '20 mm', 1, '30 mm'],
    ['10 mm', '1 in', 1, '1.3937007874 in'],
    ['10 mm', 'a', 1, '10 mm + a'],
    ['10 mm', 'a + b', -1, '10 mm - (a + b)'],
    ['0 mm', 'a/2', 1, 'a/2'],
    ['x', '3 mm', -1, 'x - 3 mm'],
  ] as const)('%s and %s (%s) give %s', (base, text, sign, expected) => {
    expect(addQuantityTexts(base, text, sign, 'length')).toBe(expected);
  });
});

describe('a plain quantity', () => {
  it('is one number with a unit of the dimension', () => {
    expect(isPlainQuantity('3 mm', 'length')).toBe(true);
    expect(isPlainQuantity('0', 'length')).toBe(true);
    expect(isPlainQuantity('3 GHz', 'length')).toBe(false);
    expect(isPlainQuantity('a', 'length')).toBe(false);
    expect(isPlainQuantity('', 'length')).toBe(false);
  });
});
