// Owns reading the quantities of one job: gathers every fault with its path, so that callers stay straight-line code.
// Must not know which quantities a job has.
import type { AppError } from '../base/result.ts';
import type { Dimension, NamedValues, QuantityReader } from '../base/quantity.ts';
import { formatQuantity, makeQuantityReader } from '../base/quantity.ts';
import { DIMENSION_NAMES } from '../base/units.ts';
import type { Point, Quantity, XY } from './job.ts';

/** 'size' must be above zero, 'depth' zero or more, 'any' merely finite. */
type Range = 'size' | 'depth' | 'any';

const LARGEST_LENGTH_METRES = 1e6;
const SMALLEST_LENGTH_METRES = 1e-12;
const MOST_FAULTS = 20;

export interface NumberReader {
  /** Faults so far, the first twenty. */
  readonly faults: readonly AppError[];
  /** SI value, or NaN after noting the fault. */
  read(text: Quantity, dimension: Dimension, path: string, range?: Range): number;
  point(point: Point, path: string): XY;
  complain(fault: AppError): void;
  /** A reader of the same values with no faults yet. */
  fork(): NumberReader;
}

export function makeNumberReader(values: NamedValues): NumberReader {
  return makeReaderOver(makeQuantityReader(values));
}

function makeReaderOver(evaluate: QuantityReader): NumberReader {
  const faults: AppError[] = [];
  const complain = (fault: AppError): void => {
    if (faults.length < MOST_FAULTS) faults.push(fault);
  };
  const read = (text: Quantity, dimension: Dimension, path: string, range: Range = 'any'): number => {
    const result = evaluate(text, dimension);
    if (!result.ok) {
      complain({ ...result.errors[0], path });
      return Number.NaN;
    }
    const problem = findRangeProblem(result.value, dimension, range);
    if (problem === null) return result.value;
    const value = formatQuantity(result.value, dimension);
    const shown = text === value ? `"${text}"` : `"${text}" is ${value}, which`;
    complain({ code: 'range', path, message: `${shown} ${problem.message}`, hint: problem.hint });
    return Number.NaN;
  };
  const point = (at: Point, path: string): XY => [read(at[0], 'length', `${path}[0]`), read(at[1], 'length', `${path}[1]`)];
  return { faults, read, point, complain, fork: () => makeReaderOver(evaluate) };
}

function findRangeProblem(value: number, dimension: Dimension, range: Range): { message: string; hint: string } | null {
  if (range === 'size' && value <= 0) {
    return { message: 'is not above zero.', hint: `Give ${DIMENSION_NAMES[dimension]} above zero.` };
  }
  if (range === 'depth' && value < 0) {
    return { message: 'is negative.', hint: `Give ${DIMENSION_NAMES[dimension]} of zero or more.` };
  }
  if (dimension !== 'length') return null;
  if (Math.abs(value) > LARGEST_LENGTH_METRES) {
    return { message: 'is beyond 1000 km.', hint: 'Check the unit.' };
  }
  if (range === 'size' && value < SMALLEST_LENGTH_METRES) {
    return { message: 'is below 1 pm.', hint: 'Check the unit.' };
  }
  return null;
}
