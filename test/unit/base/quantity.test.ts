import { describe, expect, it } from 'vitest';
import { C0, EPS0, ETA0, MU0 } from '../../../src/base/constants.ts';
import type { Dimension } from '../../../src/base/quantity.ts';
import { formatQuantity, isValueName, parseQuantity } from '../../../src/base/quantity.ts';

function value(text: string, dimension: Dimension, values: Record<string, string> = {}): number {
  const result = parseQuantity(text, dimension, values);
  if (!result.ok) throw new Error(result.errors[0].message);
  return result.value;
}

function fault(text: string, dimension: Dimension, values: Record<string, string> = {}) {
  const result = parseQuantity(text, dimension, values);
  if (result.ok) throw new Error(`${text} was read as ${result.value}`);
  return result.errors[0];
}

describe('constants', () => {
  it('agree with CODATA 2022 to the digits given there', () => {
    expect(C0).toBe(299792458);
    expect(MU0).toBe(1.25663706127e-6);
    expect(Math.abs(EPS0 / 8.8541878188e-12 - 1)).toBeLessThan(2e-10);
    expect(Math.abs(ETA0 / 376.730313412 - 1)).toBeLessThan(2e-10);
  });
});

describe('a quantity', () => {
  it.each<[string, Dimension, number]>([
    ['22.86 mm', 'length', 0.02286],
    ['0.9 in', 'length', 0.02286],
    ['5 µm', 'length', 5e-6],
    ['5 \u03bcm', 'length', 5e-6],
    ['5 um', 'length', 5e-6],
    ['1e-3 m', 'length', 1e-3],
    ['.5mm', 'length', 0.5e-3],
    ['10 mil', 'length', 0.254e-3],
    ['\u22122 mm', 'length', -0.002],
    ['8.2 GHz', 'frequency', 8.2e9],
    ['3.3 ns', 'time', 3.3e-9],
    ['30 deg', 'angle', Math.PI / 6],
    ['30°', 'angle', Math.PI / 6],
    ['0.2 rad', 'angle', 0.2],
    ['1 V/m', 'field', 1],
    ['1 mV/m', 'field', 1e-3],
    ['2 kV/m', 'field', 2e3],
    ['1 A', 'current', 1],
    ['20 mA', 'current', 0.02],
    ['1 V', 'voltage', 1],
    ['60 dB', 'decibel', 60],
    ['1.5', 'number', 1.5],
    ['0', 'length', 0],
  ])('%s is %s in SI', (text, dimension, expected) => {
    expect(value(text, dimension)).toBe(expected);
  });

  it('may be an expression over named values', () => {
    const values = { a: '22.86 mm', w: 'a/4', f: '10 GHz', turn: '30 deg', k: '2' };
    expect(value('a/2 + 1 mm', 'length', values)).toBeCloseTo(0.01243, 12);
    expect(value('-(a - w)*2', 'length', values)).toBeCloseTo(-0.03429, 12);
    expect(value('c0/f', 'length', values)).toBe(0.0299792458);
    expect(value('c0/(2*a)', 'frequency', values)).toBeCloseTo(6.557140376e9, 0);
    expect(value('sqrt(a*a + w*w)', 'length', values)).toBeCloseTo(Math.hypot(0.02286, 0.005715), 12);
    expect(value('max(a, 1 in, w)', 'length', values)).toBe(0.0254);
    expect(value('min(a, w)*k', 'length', values)).toBe(0.01143);
    expect(value('a*sin(turn)', 'length', values)).toBeCloseTo(0.01143, 12);
    expect(value('abs(-3 mm)', 'length')).toBe(0.003);
    expect(value('pi/2', 'number')).toBe(Math.PI / 2);
    expect(value('1 V / 2 mm', 'field')).toBe(500);
    expect(value('1/(2 ns)', 'frequency')).toBeCloseTo(5e8, 0);
  });

  it('keeps a unit apart from a named value of the same letter', () => {
    expect(value('2 m', 'length', { m: '3' })).toBe(2);
    expect(value('2*m', 'number', { m: '3' })).toBe(6);
    expect(value('6 V / m', 'voltage', { m: '3' })).toBe(2);
    expect(value('6 V/m', 'field', { m: '3' })).toBe(6);
    expect(value('6 V / m', 'field')).toBe(6);
  });

  it('with a decimal comma is refused with the way to write it', () => {
    const error = fault('22,86 mm', 'length');
    expect(error.message).toContain('"22,86 mm"');
    expect(error.hint).toContain('decimal sign as a point');
  });

  it('of the wrong dimension is refused by name', () => {
    expect(fault('3 GHz', 'length').message).toBe('"3 GHz" is a frequency; a length is wanted.');
    expect(fault('3', 'length').message).toBe('"3" has no unit; a length is wanted.');
    expect(fault('3 mm + 1 ns', 'length').message).toContain('a length and a time cannot be added');
    expect(fault('2 mm * 3 mm', 'length').message).toContain('something in m^2');
    expect(fault('sin(3)', 'number').hint).toContain('30 deg');
    expect(fault('30 mm', 'angle').code).toBe('dimension');
  });

  it('with a unit in the wrong case gets the right one as the mend', () => {
    expect(fault('3 ghz', 'frequency').hint).toBe('Did you mean GHz?');
  });

  it('with a product without a star gets the star as the mend', () => {
    expect(fault('2a', 'length', { a: '1 mm' }).hint).toContain('2*a');
  });

  it.each([
    '',
    '  ',
    '(1 mm',
    '1 mm)',
    '1 +',
    '* 2',
    '1 mm 2',
    'sqrt()',
    'sqrt(1, 2)',
    '1 mm ^ 2',
    '1e400',
    '1/0',
    'sqrt(-1)',
    'foo',
    'mm',
    '1..2',
    '$',
    '2 mm;',
  ])('is refused with a mend: %j', (text) => {
    const error = fault(text, 'number');
    expect(error.message.length).toBeGreaterThan(5);
    expect(error.hint).toBeTruthy();
  });

  it('that goes round in a circle is reported with the chain', () => {
    expect(fault('x', 'length', { x: 'y + 1 mm', y: 'z', z: '2*x' }).message).toContain('x -> y -> z -> x');
  });

  it('does not take a property of every object for a name', () => {
    expect(fault('toString', 'number').message).toContain('"toString", which has no value');
    expect(fault('constructor', 'number').message).toContain('which has no value');
  });

  it('that is too long or too deep is refused, not followed', () => {
    expect(fault(`1${'+1'.repeat(200)}`, 'number').message).toContain('a quantity may have 200');
    const chain = Object.fromEntries(Array.from({ length: 400 }, (_, k) => [`v${k}`, `v${k + 1}`]));
    expect(fault('v0', 'number', { ...chain, v400: '1' }).message).toContain('more than 100 deep');
  });

  it('whose names multiply without end is evaluated once each', () => {
    const doubling = Object.fromEntries(Array.from({ length: 60 }, (_, k) => [`v${k}`, `v${k + 1} + v${k + 1}`]));
    expect(value('v0', 'number', { ...doubling, v60: '1' })).toBe(2 ** 60);
  });
});

describe('formatting', () => {
  it.each<[number, Dimension, string]>([
    [0.02286, 'length', '22.86 mm'],
    [0.18, 'length', '180 mm'],
    [1.2, 'length', '1.2 m'],
    [-0.003, 'length', '-3 mm'],
    [0, 'length', '0 mm'],
    [5e-6, 'length', '5 µm'],
    [0.9999999, 'length', '1 m'],
    [8.2e9, 'frequency', '8.2 GHz'],
    [3.3e-9, 'time', '3.3 ns'],
    [Math.PI / 6, 'angle', '30 deg'],
    [60, 'decibel', '60 dB'],
    [1e-3, 'field', '1 mV/m'],
    [0.02, 'current', '20 mA'],
    [1.5, 'number', '1.5'],
    [Infinity, 'decibel', '\u221e'],
    [Number.NaN, 'length', '-'],
  ])('%s %s reads %s', (number, dimension, text) => {
    expect(formatQuantity(number, dimension)).toBe(text);
  });

  it('rounds to the digits asked for', () => {
    expect(formatQuantity(0.0123456, 'length', 3)).toBe('12.3 mm');
    expect(formatQuantity(0.99996, 'length', 4)).toBe('1 m');
  });
});

describe('names of values', () => {
  it('are letters, digits and underscores, and none of the words of the grammar', () => {
    expect(['a', 'gap_2', 'Länge', '_x'].map(isValueName)).toEqual([true, true, true, true]);
    expect(['', '2a', 'pi', 'c0', 'sqrt', 'a b', '__proto__', 'x'.repeat(41)].some(isValueName)).toBe(false);
  });
});
