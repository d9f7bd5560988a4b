import fc from 'fast-check';
import { describe, expect, it, vi } from 'vitest';
import { retargetQuantity, shiftQuantity } from '../../src/base/edit-quantity.ts';
import type { Dimension } from '../../src/base/quantity.ts';
import { formatQuantity, parseQuantity } from '../../src/base/quantity.ts';

// Hundreds of cases each; a busy machine may need longer than a plain test may take.
vi.setConfig({ testTimeout: 60_000 });

const dimensions: readonly Dimension[] = [
  'length',
  'frequency',
  'time',
  'angle',
  'field',
  'current',
  'voltage',
  'decibel',
  'number',
];
const anyDimension = fc.constantFrom(...dimensions);
const realistic = fc
  .tuple(fc.double({ min: 1, max: 10, noNaN: true }), fc.integer({ min: -14, max: 13 }), fc.boolean())
  .map(([mantissa, exponent, negative]) => (negative ? -1 : 1) * mantissa * 10 ** exponent);

interface Sum {
  readonly text: string;
  readonly value: number;
}

describe('quantities', () => {
  it('read back what was written, to the digits written', () => {
    fc.assert(
      fc.property(realistic, anyDimension, fc.integer({ min: 1, max: 17 }), (value, dimension, digits) => {
        const back = parseQuantity(formatQuantity(value, dimension, digits), dimension);
        // Half a unit of the last digit, relative to a leading digit of 1; a few roundings of doubles on top.
        const tolerance = 0.5 * 10 ** (1 - digits) + 1e-15;
        expect(back.ok && Math.abs(back.value / value - 1)).toBeLessThanOrEqual(tolerance);
      }),
      { numRuns: 500 },
    );
  });

  it('never throw, whatever the text, and give a finite number or an error with a mend', () => {
    const shards = fc.constantFrom(
      '1',
      '2.5',
      ' mm',
      'a',
      'b',
      '(',
      ')',
      '+',
      '-',
      '*',
      '/',
      'sqrt(',
      ',',
      ' V/m',
      'pi',
      '°',
      '\u2212',
      'e5',
      ' ',
      'in',
    );
    const texts = fc.oneof(
      fc.string({ unit: 'binary', maxLength: 300 }),
      fc.array(shards, { maxLength: 60 }).map((parts) => parts.join('')),
    );
    fc.assert(
      fc.property(texts, texts, texts, anyDimension, (text, a, b, dimension) => {
        const result = parseQuantity(text, dimension, { a, b });
        if (result.ok) expect(Number.isFinite(result.value)).toBe(true);
        else expect(result.errors[0].hint).toBeTruthy();
      }),
      { numRuns: 1500 },
    );
  });

  it('evaluate sums, products and brackets as arithmetic does', () => {
    const tree = fc.letrec<{ node: Sum }>((tie) => ({
      node: fc.oneof(
        { depthSize: 'small' },
        fc.integer({ min: 1, max: 99 }).map((value) => ({ text: String(value), value })),
        fc.tuple(tie('node'), fc.constantFrom('+', '-', '*'), tie('node')).map(([a, sign, b]) => ({
          text: `(${a.text} ${sign} ${b.text})`,
          value: sign === '+' ? a.value + b.value : sign === '-' ? a.value - b.value : a.value * b.value,
        })),
      ),
    })).node;
    fc.assert(
      fc.property(tree, ({ text, value }) => {
        fc.pre(text.length <= 200);
        expect(parseQuantity(text, 'number')).toEqual({ ok: true, value });
      }),
    );
  });

  it('shift and retarget to the value asked for, however they are written', () => {
    const texts = fc.constantFrom('20 mm', '0.9 in', 'a/2', 'a/2 + 3 mm', 'a - 1 in', '0', '5 \u03bcm', '-3 mm', '2*(a + 1 mm)');
    const values = { a: '40 mm' };
    fc.assert(
      fc.property(texts, fc.array(fc.integer({ min: -50_000, max: 50_000 }), { maxLength: 6 }), (text, steps) => {
        const start = parseQuantity(text, 'length', values);
        const shifted = steps.reduce<string>((before, step) => shiftQuantity(before, step * 1e-6, 'length'), text);
        const end = parseQuantity(shifted, 'length', values);
        const wanted = (start.ok ? start.value : Number.NaN) + steps.reduce((sum, step) => sum + step, 0) * 1e-6;
        // Twelve digits of values up to 0.3 m, once per step.
        expect(end.ok && Math.abs(end.value - wanted)).toBeLessThan(5e-12);
        const target = parseQuantity(retargetQuantity(text, wanted, 'length', values), 'length', values);
        expect(target.ok && Math.abs(target.value - wanted)).toBeLessThan(5e-12);
      }),
    );
  });
});
