// Owns changing the text of a quantity by a number while keeping the way the person wrote it.
// Must not know jobs or the sheet.
import type { Dimension, NamedValues } from './quantity.ts';
import { formatQuantity, parseQuantity } from './quantity.ts';
import { DIMENSIONS, sameExponents, UNITS } from './units.ts';

const PLAIN_QUANTITY = /^\s*([-+]?(?:\d+\.?\d*|\.\d+)(?:[eE][-+]?\d+)?)\s*([\p{L}°]+(?:\/[\p{L}]+)?)\s*$/u;
/** An expression whose last term is plain: "a/2 + 3 mm". The sign stands apart, as `shiftQuantity` writes it. */
const TRAILING_TERM = /^(.*\S) ([-+]) ((?:\d+\.?\d*|\.\d+)(?:[eE][-+]?\d+)? ?[\p{L}°]+(?:\/[\p{L}]+)?)$/u;
/** Digits kept when a plain value is rewritten: hides rounding noise, keeps a picometre in a metre. */
const DIGITS_KEPT = 12;

interface PlainQuantity {
  readonly value: number;
  readonly unit: string;
}

/** Reads a text known to be good; NaN when it is not. */
function valueOf(text: string, dimension: Dimension, values: NamedValues): number {
  const result = parseQuantity(text, dimension, values);
  return result.ok ? result.value : Number.NaN;
}

function readPlain(text: string, dimension: Dimension): PlainQuantity | null {
  const match = PLAIN_QUANTITY.exec(text);
  const unit = UNITS.get((match?.[2] ?? '').replaceAll('\u03bc', '\u00b5'));
  if (match === null || unit === undefined || !sameExponents(unit.exponents, DIMENSIONS[dimension])) return null;
  const value = valueOf(text, dimension, {});
  return Number.isFinite(value) ? { value, unit: match[2] ?? '' } : null;
}

/** True for a number with a unit, or a bare zero; false for an expression. */
export function isPlainQuantity(text: string, dimension: Dimension): boolean {
  return readPlain(text, dimension) !== null || Number(text.trim() || Number.NaN) === 0;
}

/** SI value written in a given unit: 0.02286 in "in" is "0.9 in". */
function writeInUnit(value: number, unitText: string): string {
  const unit = UNITS.get(unitText.replaceAll('\u03bc', '\u00b5'));
  const scaled = unit === undefined ? value : (value * unit.over) / unit.times;
  return `${String(Number(scaled.toPrecision(DIGITS_KEPT)))} ${unitText}`;
}

/** A sum with less than this share of either term is rounding noise and is written as zero. */
const NOISE = 1e-14;

function tidySum(a: number, b: number): number {
  const sum = a + b;
  return Math.abs(sum) < NOISE * Math.max(Math.abs(a), Math.abs(b)) ? 0 : sum;
}

/** Adds an SI amount: "20 mm" becomes "23 mm", "0.9 in" stays in inches, "a/2" becomes "a/2 + 3 mm". */
export function shiftQuantity(text: string, delta: number, dimension: Dimension): string {
  if (delta === 0) return text;
  const plain = readPlain(text, dimension);
  if (plain !== null) return writeInUnit(tidySum(plain.value, delta), plain.unit);
  if (isPlainQuantity(text, dimension)) return formatQuantity(delta, dimension, DIGITS_KEPT);
  const trailing = TRAILING_TERM.exec(text);
  const term = trailing === null ? null : readPlain(trailing[3] ?? '', dimension);
  if (trailing !== null && term !== null) {
    const sum = tidySum(trailing[2] === '-' ? -term.value : term.value, delta);
    if (sum === 0) return trailing[1] ?? text;
    return `${trailing[1]} ${sum < 0 ? '-' : '+'} ${writeInUnit(Math.abs(sum), term.unit)}`;
  }
  return `${text.trim()} ${delta < 0 ? '-' : '+'} ${formatQuantity(Math.abs(delta), dimension, DIGITS_KEPT)}`;
}

/** The same text made to mean `value`: plain values in their own unit, expressions with a term added. */
export function retargetQuantity(text: string, value: number, dimension: Dimension, values: NamedValues): string {
  const plain = readPlain(text, dimension);
  if (plain !== null) return writeInUnit(value, plain.unit);
  const now = valueOf(text, dimension, values);
  if (Number.isNaN(now)) return formatQuantity(value, dimension, DIGITS_KEPT);
  return shiftQuantity(text, tidySum(value, -now), dimension);
}

/** Text for `base` plus (sign 1) or minus (sign -1) `text`, both quantities of one dimension; expressions are kept. */
export function addQuantityTexts(base: string, text: string, sign: 1 | -1, dimension: Dimension): string {
  const basePlain = readPlain(base, dimension);
  const plain = readPlain(text, dimension);
  if (plain !== null) {
    if (basePlain !== null) return writeInUnit(tidySum(basePlain.value, sign * plain.value), plain.unit);
    return shiftQuantity(base, sign * plain.value, dimension);
  }
  const baseIsZero = isPlainQuantity(base, dimension) && (basePlain?.value ?? 0) === 0;
  if (baseIsZero) return sign === 1 ? text.trim() : `-(${text.trim()})`;
  return `${base.trim()} ${sign === 1 ? `+ ${text.trim()}` : `- (${text.trim()})`}`;
}
