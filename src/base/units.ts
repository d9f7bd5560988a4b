// Owns the units a person may write and the small algebra of dimensions.
// Must not know expressions, jobs, or how numbers are written.

/** Exponents of metre, second, ampere, volt, radian and decibel. Angle and decibel are kept apart to catch slips. */
export type Exponents = readonly [length: number, time: number, current: number, voltage: number, angle: number, decibel: number];

export type Dimension = 'length' | 'frequency' | 'time' | 'angle' | 'field' | 'current' | 'voltage' | 'decibel' | 'number';

export interface Unit {
  /** SI value = value * times / over. Two whole numbers where it can be, so that 5 µm is the number nearest to 5e-6. */
  readonly times: number;
  readonly over: number;
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

const PREFIXES: readonly (readonly [symbol: string, times: number, over: number])[] = [
  ['f', 1, 1e15],
  ['p', 1, 1e12],
  ['n', 1, 1e9],
  ['µ', 1, 1e6],
  ['u', 1, 1e6],
  ['m', 1, 1e3],
  ['', 1, 1],
  ['k', 1e3, 1],
  ['M', 1e6, 1],
  ['G', 1e9, 1],
  ['T', 1e12, 1],
];

function makeUnits(): ReadonlyMap<string, Unit> {
  const units = new Map<string, Unit>();
  const addPrefixed = (symbol: string, dimension: Dimension, prefixes: string): void => {
    for (const [prefix, times, over] of PREFIXES) {
      if (prefix === '' || prefixes.includes(prefix))
        units.set(prefix + symbol, { times, over, exponents: DIMENSIONS[dimension] });
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
    ['cm', 1, 100, DIMENSIONS.length],
    ['in', 254, 1e4, DIMENSIONS.length],
    ['mil', 254, 1e7, DIMENSIONS.length],
    ['ft', 3048, 1e4, DIMENSIONS.length],
    ['deg', Math.PI, 180, DIMENSIONS.angle],
    ['°', Math.PI, 180, DIMENSIONS.angle],
    ['dB', 1, 1, DIMENSIONS.decibel],
    ['m/s', 1, 1, [1, -1, 0, 0, 0, 0]],
  ];
  for (const [symbol, times, over, exponents] of others) units.set(symbol, { times, over, exponents });
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
