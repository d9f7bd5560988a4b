// Owns the grammar of quantities: numbers with units, + - * / ( ), a few functions, named values. Evaluates; never throws.
// Must not know jobs or which dimension the asker wants.
import type { AppError, Result } from './result.ts';
import { fail, ok } from './result.ts';
import { C0 } from './constants.ts';
import type { Exponents, Unit } from './units.ts';
import { combineExponents, DIMENSIONS, halveExponents, nameExponents, PLAIN, sameExponents, UNITS } from './units.ts';

/** A value in SI units with its dimension. */
export interface Measure {
  readonly value: number;
  readonly exponents: Exponents;
}

/** What a name stands for; `null` when there is no such name. `depth` counts brackets and names entered so far. */
export type NameLookup = (name: string, depth: number) => Result<Measure> | null;

const LONGEST_EXPRESSION = 200;
/** Brackets, signs and names of names inside one another; keeps the recursion far from the end of the stack. */
const DEEPEST_EXPRESSION = 100;

const CONSTANTS: ReadonlyMap<string, Measure> = new Map([
  ['pi', { value: Math.PI, exponents: PLAIN }],
  ['c0', { value: C0, exponents: [1, -1, 0, 0, 0, 0] as const }],
]);

export const FUNCTION_NAMES: readonly string[] = ['sqrt', 'min', 'max', 'abs', 'sin', 'cos', 'tan'];
export const CONSTANT_NAMES: readonly string[] = [...CONSTANTS.keys()];

interface Token {
  readonly kind: 'number' | 'word' | 'sign' | 'end';
  readonly text: string;
  readonly at: number;
}

const TOKEN =
  /\s*(?:(?<number>(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?)|(?<word>[\p{L}_°][\p{L}\p{N}_]*)|(?<sign>[-+*/(),\u2212]))/uy;

const NOTHING: Measure = { value: Number.NaN, exponents: PLAIN };

function quote(text: string): string {
  return `"${text.length > 60 ? `${text.slice(0, 57)}...` : text}"`;
}

/** `literal` is the number's own text when it stands right before the unit: its decimals are then moved exactly. */
function applyUnit(measure: Measure, unit: Unit, literal: string | null): Measure {
  const exponents = combineExponents(measure.exponents, unit.exponents, 1);
  if (literal === null || unit.tens === null) return { value: (measure.value * unit.times) / unit.over, exponents };
  const [mantissa = '', exponent = '0'] = literal.toLowerCase().split('e');
  return { value: Number(`${mantissa}e${Number(exponent) + unit.tens}`), exponents };
}

function splitTokens(text: string): Result<readonly Token[]> {
  const tokens: Token[] = [];
  const end = text.trimEnd().length;
  TOKEN.lastIndex = 0;
  while (TOKEN.lastIndex < end) {
    const from = TOKEN.lastIndex;
    const match = TOKEN.exec(text);
    if (match?.groups === undefined) {
      const strange = [...text.slice(from).trimStart()][0] ?? '';
      return fail({
        code: 'quantity',
        message: `${quote(text)} cannot be read at "${strange}".`,
        hint: 'Write a number with its unit, such as 22.86 mm, or a sum of such with + - * / and brackets.',
      });
    }
    const { number, word, sign } = match.groups;
    const found = number ?? word ?? sign ?? '';
    const kind = number !== undefined ? 'number' : word !== undefined ? 'word' : 'sign';
    tokens.push({
      kind,
      text: found === '\u2212' ? '-' : found.replaceAll('\u03bc', '\u00b5'),
      at: TOKEN.lastIndex - found.length,
    });
  }
  tokens.push({ kind: 'end', text: '', at: text.length });
  return ok(tokens);
}

/** Value and dimension of `text`, or the first thing wrong with it. */
export function evaluateExpression(text: string, lookUp: NameLookup, depth = 0): Result<Measure> {
  if (text.length > LONGEST_EXPRESSION) {
    return fail({
      code: 'quantity',
      message: `${quote(text)} has ${text.length} characters; a quantity may have ${LONGEST_EXPRESSION}.`,
      hint: 'Give parts of it a name under the values.',
    });
  }
  if (text.trim() === '') {
    return fail({ code: 'quantity', message: 'The value is empty.', hint: 'Write a number with its unit, such as 22.86 mm.' });
  }
  const tokens = splitTokens(text);
  return tokens.ok ? new Reader(text, tokens.value, lookUp).readAll(depth) : tokens;
}

/** The text with one name written for another; units, which follow a number, a name or a bracket, are left alone. */
export function renameInExpression(text: string, from: string, to: string): string {
  const tokens = splitTokens(text);
  if (!tokens.ok) return text;
  const isName = ({ kind, text: word }: Token, k: number): boolean => {
    const before = tokens.value[k - 1];
    return kind === 'word' && word === from && (before === undefined || (before.kind === 'sign' && before.text !== ')'));
  };
  return tokens.value
    .filter(isName)
    .reduceRight((renamed, { at }) => renamed.slice(0, at) + to + renamed.slice(at + from.length), text);
}

/** Recursive descent over the tokens. The first trouble is kept and everything after it is NOTHING. */
class Reader {
  private readonly text: string;
  private readonly tokens: readonly Token[];
  private readonly lookUp: NameLookup;
  private next = 0;
  private trouble: AppError | null = null;

  constructor(text: string, tokens: readonly Token[], lookUp: NameLookup) {
    this.text = text;
    this.tokens = tokens;
    this.lookUp = lookUp;
  }

  readAll(depth: number): Result<Measure> {
    const measure = this.readSum(depth);
    const left = this.peek();
    if (this.trouble === null && left.kind !== 'end') this.complainOfLeftOver(left);
    if (this.trouble === null && !Number.isFinite(measure.value)) {
      this.complain(`${quote(this.text)} has no finite value.`, 'Look for a division by zero or a root of a negative number.');
    }
    return this.trouble === null ? ok(measure) : fail(this.trouble);
  }

  private peek(ahead = 0): Token {
    return this.tokens[this.next + ahead] ?? { kind: 'end', text: '', at: this.text.length };
  }

  private take(sign: string): boolean {
    const token = this.peek();
    if (token.kind !== 'sign' || token.text !== sign) return false;
    this.next += 1;
    return true;
  }

  private complain(message: string, hint: string): Measure {
    this.trouble ??= { code: 'quantity', message, hint };
    return NOTHING;
  }

  private complainOfLeftOver(left: Token): void {
    if (left.text === ',') {
      this.complain(
        `${quote(this.text)} has a comma where none can stand.`,
        'Write the decimal sign as a point, and no sign between thousands: 22.86 mm.',
      );
    } else if (left.kind === 'word' && this.tokens[this.next - 1]?.kind === 'number') {
      this.complainOfUnit(left.text);
    } else {
      this.complain(`${quote(this.text)} has "${left.text}" where + - * or / is expected.`, 'Write products with a star: 2*a.');
    }
  }

  private complainOfUnit(word: string): void {
    const nearest = [...UNITS.keys()].find((unit) => unit.toLowerCase() === word.toLowerCase());
    const named = this.lookUp(word, 0) !== null;
    const hint = named
      ? `To multiply by the value named ${word}, write a star: 2*${word}.`
      : nearest !== undefined
        ? `Did you mean ${nearest}?`
        : 'Units are m, mm, µm, in, mil, Hz to THz, fs to s, deg, rad, V/m, A, V and dB.';
    this.complain(`${quote(this.text)} has the unit "${word}", which is not known.`, hint);
  }

  private readSum(depth: number): Measure {
    let sum = this.readProduct(depth);
    while (this.trouble === null) {
      const sign = this.take('+') ? 1 : this.take('-') ? -1 : 0;
      if (sign === 0) break;
      const term = this.readProduct(depth);
      if (this.trouble !== null) break;
      if (!sameExponents(sum.exponents, term.exponents)) return this.complainOfMix('added', sum, term);
      sum = { value: sum.value + sign * term.value, exponents: sum.exponents };
    }
    return sum;
  }

  private complainOfMix(verb: string, a: Measure, b: Measure): Measure {
    return this.complain(
      `In ${quote(this.text)}, ${nameExponents(a.exponents)} and ${nameExponents(b.exponents)} cannot be ${verb}.`,
      'Give both the same kind of unit.',
    );
  }

  private readProduct(depth: number): Measure {
    let product = this.readSigned(depth);
    while (this.trouble === null) {
      const sign = this.take('*') ? 1 : this.take('/') ? -1 : 0;
      if (sign === 0) break;
      const factor = this.readSigned(depth);
      product = {
        value: sign === 1 ? product.value * factor.value : product.value / factor.value,
        exponents: combineExponents(product.exponents, factor.exponents, sign),
      };
    }
    return product;
  }

  private readSigned(depth: number): Measure {
    let negative = false;
    for (;;) {
      if (this.take('-')) negative = !negative;
      else if (!this.take('+')) break;
    }
    const measure = this.readPrimary(depth);
    return negative ? { value: -measure.value, exponents: measure.exponents } : measure;
  }

  private readPrimary(depth: number): Measure {
    if (depth > DEEPEST_EXPRESSION) {
      return this.complain(
        `${quote(this.text)} nests brackets and named values more than ${DEEPEST_EXPRESSION} deep.`,
        'Flatten it, or give some of the values plain numbers.',
      );
    }
    const token = this.peek();
    if (token.kind === 'number') {
      this.next += 1;
      return this.withUnit({ value: Number(token.text), exponents: PLAIN }, token.text);
    }
    if (token.kind === 'word') return this.readWord(token.text, depth);
    if (this.take('(')) {
      const inner = this.readSum(depth + 1);
      if (this.trouble !== null) return NOTHING;
      return this.take(')') ? this.withUnit(inner) : this.complainOfBracket();
    }
    const what = token.kind === 'end' ? 'ends' : `has "${token.text}"`;
    return this.complain(
      `${quote(this.text)} ${what} where a value is expected.`,
      'Write a number with its unit, such as 22.86 mm.',
    );
  }

  private complainOfBracket(): Measure {
    if (this.peek().text === ',')
      return this.complain(
        `${quote(this.text)} has a comma where none can stand.`,
        'Write the decimal sign as a point: 22.86 mm.',
      );
    return this.complain(`${quote(this.text)} has a bracket that is not closed.`, 'Close it with ")".');
  }

  /** A unit may follow a number or a bracket. "V/m" is one unit unless it is written apart and m is a named value. */
  private withUnit(measure: Measure, literal: string | null = null): Measure {
    const word = this.peek();
    if (word.kind !== 'word') return measure;
    const denominator = this.peek(2);
    if (this.peek(1).text === '/' && denominator.kind === 'word') {
      const compound = UNITS.get(`${word.text}/${denominator.text}`);
      const tight = denominator.at === word.at + word.text.length + 1;
      if (compound !== undefined && (tight || this.lookUp(denominator.text, 0) === null)) {
        this.next += 3;
        return applyUnit(measure, compound, literal);
      }
    }
    const unit = UNITS.get(word.text);
    if (unit === undefined) return measure;
    this.next += 1;
    return applyUnit(measure, unit, literal);
  }

  private readWord(word: string, depth: number): Measure {
    this.next += 1;
    if (this.peek().text === '(' && FUNCTION_NAMES.includes(word)) return this.readFunction(word, depth);
    const constant = CONSTANTS.get(word);
    if (constant !== undefined) return constant;
    const named = this.lookUp(word, depth + 1);
    if (named === null) {
      const isUnit = UNITS.has(word);
      return this.complain(
        `${quote(this.text)} uses "${word}", which has no value.`,
        isUnit ? `Put a number before the unit: 1 ${word}.` : `Add ${word} to the values, or correct the name.`,
      );
    }
    if (named.ok) return named.value;
    this.trouble ??= named.errors[0];
    return NOTHING;
  }

  private readFunction(name: string, depth: number): Measure {
    this.next += 1;
    const first = this.readSum(depth + 1);
    const all: Measure[] = [first];
    while (this.trouble === null && this.take(',')) all.push(this.readSum(depth + 1));
    if (this.trouble !== null) return NOTHING;
    if (!this.take(')')) return this.complain(`${quote(this.text)} has a bracket that is not closed.`, 'Close it with ")".');
    const many = name === 'min' || name === 'max';
    if (!many && all.length > 1) {
      return this.complain(
        `${quote(this.text)} gives ${name} ${all.length} values; it takes one.`,
        'Write the decimal sign as a point.',
      );
    }
    return this.applyFunction(name, first, all);
  }

  private applyFunction(name: string, first: Measure, all: readonly Measure[]): Measure {
    if (name === 'sqrt') return { value: Math.sqrt(first.value), exponents: halveExponents(first.exponents) };
    if (name === 'abs') return { value: Math.abs(first.value), exponents: first.exponents };
    if (name === 'min' || name === 'max') {
      const odd = all.find((measure) => !sameExponents(measure.exponents, first.exponents));
      if (odd !== undefined) return this.complainOfMix('compared', first, odd);
      const values = all.map((measure) => measure.value);
      return { value: name === 'min' ? Math.min(...values) : Math.max(...values), exponents: first.exponents };
    }
    if (!sameExponents(first.exponents, DIMENSIONS.angle)) {
      return this.complain(
        `${quote(this.text)} takes the ${name} of ${nameExponents(first.exponents)}; it wants an angle.`,
        `Give it a unit: ${name}(30 deg) or ${name}(0.5 rad).`,
      );
    }
    const value = name === 'sin' ? Math.sin(first.value) : name === 'cos' ? Math.cos(first.value) : Math.tan(first.value);
    return { value, exponents: PLAIN };
  }
}
