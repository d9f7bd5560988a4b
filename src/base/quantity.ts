// Owns reading and writing quantities of a wanted dimension: "22.86 mm" <-> 0.02286.
// Must not know jobs.
import type { Measure } from './expression.ts';
import { CONSTANT_NAMES, evaluateExpression, FUNCTION_NAMES } from './expression.ts';
import type { Result } from './result.ts';
import { fail, ok } from './result.ts';
import type { Dimension } from './units.ts';
import { DIMENSION_EXAMPLES, DIMENSION_NAMES, DIMENSIONS, nameExponents, PLAIN, sameExponents } from './units.ts';

export type { Dimension } from './units.ts';

/** Named values as written: `{ a: '22.86 mm', gap: 'a/2' }`. */
export type NamedValues = Readonly<Record<string, string>>;

/** Reads quantities against one set of named values; each name is evaluated once. */
export type QuantityReader = (text: string, dimension: Dimension) => Result<number>;

const VALUE_NAME = /^[\p{L}_][\p{L}\p{N}_]{0,39}$/u;

export function isValueName(name: string): boolean {
  return VALUE_NAME.test(name) && !FUNCTION_NAMES.includes(name) && !CONSTANT_NAMES.includes(name) && name !== '__proto__';
}

/** Evaluates text against named values, whatever its dimension. */
export function makeEvaluator(values: NamedValues = {}): (text: string) => Result<Measure> {
  const known = new Map<string, Result<Measure>>();
  const under: string[] = [];
  const lookUp = (name: string, depth: number): Result<Measure> | null => {
    const text = Object.hasOwn(values, name) ? values[name] : undefined;
    if (text === undefined) return null;
    const done = known.get(name);
    if (done !== undefined) return done;
    if (under.includes(name)) {
      const chain = [...under.slice(under.indexOf(name)), name].join(' -> ');
      return fail({
        code: 'cycle',
        message: `The named values go round in a circle: ${chain}.`,
        hint: `Give ${name} a plain value.`,
      });
    }
    under.push(name);
    const result = evaluateExpression(text, lookUp, depth);
    under.pop();
    // Only what does not hang on the place of the asker may be kept: a circle or a depth seen from inside is not final.
    if (result.ok || under.length === 0) known.set(name, result);
    return result;
  };
  return (text) => evaluateExpression(text, lookUp);
}

export function makeQuantityReader(values: NamedValues = {}): QuantityReader {
  const evaluate = makeEvaluator(values);
  return (text, dimension) => {
    const result = evaluate(text);
    if (!result.ok) return result;
    const { value, exponents } = result.value;
    if (sameExponents(exponents, DIMENSIONS[dimension])) return ok(value);
    const plain = sameExponents(exponents, PLAIN);
    if (plain && value === 0) return ok(0);
    const shown = text.length > 60 ? `${text.slice(0, 57)}...` : text;
    return fail({
      code: 'dimension',
      message: plain
        ? `"${shown}" has no unit; ${DIMENSION_NAMES[dimension]} is wanted.`
        : `"${shown}" is ${nameExponents(exponents)}; ${DIMENSION_NAMES[dimension]} is wanted.`,
      hint: `Write it like ${DIMENSION_EXAMPLES[dimension]}.`,
    });
  };
}

/** SI value of `text` (metres, hertz, seconds, radians, V/m, A, V, dB, or a plain number). Never throws. */
export function parseQuantity(text: string, dimension: Dimension, values: NamedValues = {}): Result<number> {
  return makeQuantityReader(values)(text, dimension);
}

const SYMBOLS: Readonly<Record<Dimension, string>> = {
  length: 'm',
  frequency: 'Hz',
  time: 's',
  angle: 'deg',
  field: 'V/m',
  current: 'A',
  voltage: 'V',
  decibel: 'dB',
  number: '',
};

/** Prefixes each dimension is written with, from small to large; powers of a thousand. */
const STEPS: Readonly<Partial<Record<Dimension, readonly (readonly [prefix: string, exponent: number])[]>>> = {
  length: [
    ['p', -12],
    ['n', -9],
    ['µ', -6],
    ['m', -3],
    ['', 0],
    ['k', 3],
  ],
  frequency: [
    ['', 0],
    ['k', 3],
    ['M', 6],
    ['G', 9],
    ['T', 12],
  ],
  time: [
    ['f', -15],
    ['p', -12],
    ['n', -9],
    ['µ', -6],
    ['m', -3],
    ['', 0],
  ],
  field: [
    ['n', -9],
    ['µ', -6],
    ['m', -3],
    ['', 0],
    ['k', 3],
    ['M', 6],
  ],
  current: [
    ['n', -9],
    ['µ', -6],
    ['m', -3],
    ['', 0],
    ['k', 3],
  ],
  voltage: [
    ['n', -9],
    ['µ', -6],
    ['m', -3],
    ['', 0],
    ['k', 3],
  ],
};

/** value * 10^-exponent without the last-digit noise of a division by an inexact power of ten. */
function scaleDown(value: number, exponent: number): number {
  return exponent >= 0 ? value / 10 ** exponent : value * 10 ** -exponent;
}

/** At most `digits` significant digits, no trailing zeros; exponent form only far from 1. */
function writeNumber(value: number, digits: number): string {
  return String(Number(value.toPrecision(Math.min(17, Math.max(1, digits)))));
}

/**
 * A value in SI units as a person writes it: "22.86 mm", "8.2 GHz", "30 deg". Reads back through `parseQuantity` to
 * within `digits` significant digits. Not a number is "-", infinity the usual sign.
 */
export function formatQuantity(value: number, dimension: Dimension, digits = 6): string {
  if (Number.isNaN(value)) return '-';
  if (!Number.isFinite(value)) return value > 0 ? '\u221e' : '-\u221e';
  const symbol = SYMBOLS[dimension];
  const steps = STEPS[dimension];
  if (steps === undefined || value === 0) {
    const zeroUnit = dimension === 'length' && value === 0 ? 'mm' : symbol;
    const number = writeNumber(dimension === 'angle' ? (value * 180) / Math.PI : value, digits);
    return zeroUnit === '' ? number : `${number} ${zeroUnit}`;
  }
  // Rounding first: 999.9999 mm at four digits is 1 m, not 1000 mm.
  const magnitude = Math.abs(Number(value.toPrecision(Math.min(17, Math.max(1, digits)))));
  let best = steps[0];
  for (const step of steps) if (scaleDown(magnitude, step[1]) >= 1) best = step;
  if (best === undefined) return '-';
  return `${writeNumber(scaleDown(value, best[1]), digits)} ${best[0]}${symbol}`;
}
