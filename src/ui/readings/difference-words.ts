// Owns what two cursors read together.
// Must not know curves or plots.
import { numberWords } from './scale-words.ts';

interface Reading {
  readonly db: number;
  /** 0 where the value is known. */
  readonly cause: number;
}

/** Second less first. An unknown value has no difference from anything. */
export function differenceWords(first: Reading, second: Reading): string {
  return first.cause === 0 && second.cause === 0 ? `${numberWords(second.db - first.db, 2)} dB` : 'unknown';
}
