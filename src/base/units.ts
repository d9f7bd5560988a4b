// Owns the units a person may write and the small algebra of dimensions.
// Must not know expressions, jobs, or how numbers are written.

/** Exponents of metre, second, ampere, volt, radian and decibel. Angle and decibel are kept apart to catch slips. */
export type Exponents = readonly [length: number, time: number, current: number, voltage: number, angle: number, decibel: number];

export type Dimension = 'length' | 'frequency' | 'time' | 'angle' | 'field' | 'current' | 'voltage' | 'decibel' | 'number';

export interface Unit {
  /** SI value = value * times / over. */
  readonly times: number;
  readonly over: number;
  /** The power of ten that times / over is, or null. Lets 8.2 GHz be exactly the number nearest to 8.2e9. */
  readonly tens: number | null;
  readonly exponents: Exponents;
}

export const PLAIN: Exponents = [0, 0, 0, 0, 0, 0];

export const DIMENSIONS: Readonly<Record<Dimension, Exponents>> = {
  length: [1, 0, 0, 0, 0, 0],
  frequency: [0, -1, 0, 0, 0, 0],
  time: [0, 1, 0, 0, 0, 0],
  angle: [0, 0, 0, 0, 1, 0],
  field: [-1, 0, 0, 1, 0, 0],
  current: [0, 0, 1, 0, 0, 0],
  voltage: [0, 0, 0, 1, 0, 0],
  decibel: [0, 0, 0, 0, 0, 1],
  number: PLAIN,
};

/** Names with their article, for sentences. */
export const DIMENSION_NAMES: Readonly<Record<Dimension, string>> = {
  length: 'a length',
  frequency: 'a frequency',
  time: 'a time',
  angle: 'an angle',
  field: 'an electric field',
  current: 'a current',
  voltage: 'a voltage',
  decibel: 'a number of decibels',
  number: 'a plain number',
};

/** What to type, for the mend of an error. */
export const DIMENSION_EXAMPLES: Readonly<Record<Dimension, string>> = {
  length: '22.86 mm',
  frequency: '8.2 GHz',
  time: '3.3 ns',
  angle: '30 deg',
  field: '1 V/m',
  current: '1 A',
  voltage: '1 V',
  decibel: '60 dB',
  number: '1.5',
};

const PREFIXES: readonly (readonly [symbol: string, tens: number])[] = [
  ['f', -15],
  ['p', -12],
  ['n', -9],
  ['µ', -6],
  ['u', -6],
  ['m', -3],
  ['', 0],
  ['k', 3],
  ['M', 6],
  ['G', 9],
  ['T', 12],
];

function makeDecimalUnit(tens: number, exponents: Exponents): Unit {
  return { times: tens > 0 ? 10 ** tens : 1, over: tens < 0 ? 10 ** -tens : 1, tens, exponents };
}

function makeUnits(): ReadonlyMap<string, Unit> {
  const units = new Map<string, Unit>();
  const addPrefixed = (symbol: string, dimension: Dimension, prefixes: string): void => {
    for (const [prefix, tens] of PREFIXES) {
      if (prefix === '' || prefixes.includes(prefix)) units.set(prefix + symbol, makeDecimalUnit(tens, DIMENSIONS[dimension]));
    }
  };
  addPrefixed('m', 'length', 'pnµumk');
  addPrefixed('Hz', 'frequency', 'kMGT');
  addPrefixed('s', 'time', 'fpnµum');
  addPrefixed('rad', 'angle', 'm');
  addPrefixed('V/m', 'field', 'nµumkM');
  addPrefixed('A', 'current', 'nµumk');
  addPrefixed('V', 'voltage', 'nµumk');
  const others: readonly (readonly [string, number, number, Exponents])[] = [
    ['in', 254, 1e4, DIMENSIONS.length],
    ['mil', 254, 1e7, DIMENSIONS.length],
    ['ft', 3048, 1e4, DIMENSIONS.length],
    ['deg', Math.PI, 180, DIMENSIONS.angle],
    ['°', Math.PI, 180, DIMENSIONS.angle],
  ];
  for (const [symbol, times, over, exponents] of others) units.set(symbol, { times, over, tens: null, exponents });
  units.set('cm', makeDecimalUnit(-2, DIMENSIONS.length));
  units.set('dB', makeDecimalUnit(0, DIMENSIONS.decibel));
  units.set('m/s', makeDecimalUnit(0, [1, -1, 0, 0, 0, 0]));
  return units;
}

export const UNITS: ReadonlyMap<string, Unit> = makeUnits();

export function sameExponents(a: Exponents, b: Exponents): boolean {
  return a.every((exponent, k) => exponent === b[k]);
}

/** a + sign * b: the exponents of a product (sign 1) or quotient (sign -1). */
export function combineExponents(a: Exponents, b: Exponents, sign: 1 | -1): Exponents {
  return [a[0] + sign * b[0], a[1] + sign * b[1], a[2] + sign * b[2], a[3] + sign * b[3], a[4] + sign * b[4], a[5] + sign * b[5]];
}

export function halveExponents(a: Exponents): Exponents {
  return [a[0] / 2, a[1] / 2, a[2] / 2, a[3] / 2, a[4] / 2, a[5] / 2];
}

/** "a length", or the unit when the dimension has no name of ours: "something in m^2". */
export function nameExponents(exponents: Exponents): string {
  for (const [dimension, known] of Object.entries(DIMENSIONS) as [Dimension, Exponents][]) {
    if (sameExponents(known, exponents)) return DIMENSION_NAMES[dimension];
  }
  const symbols = ['m', 's', 'A', 'V', 'rad', 'dB'];
  const factors = exponents.flatMap((n, k) => (n === 0 ? [] : [n === 1 ? symbols[k] : `${symbols[k]}^${n}`]));
  return `something in ${factors.join(' ')}`;
}
