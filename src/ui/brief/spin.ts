// Owns the sensible step by which a value is spun with the arrow keys.
// Must not know fields on the screen or the job.
import { shiftQuantity } from '../../base/edit-quantity.ts';
import type { Dimension, NamedValues } from '../../base/quantity.ts';
import { parseQuantity } from '../../base/quantity.ts';

const PLAIN = /^\s*([-+]?(?:\d+\.?\d*|\.\d+)(?:[eE][-+]?\d+)?)\s*(\S*)\s*$/u;

/** A tenth of the leading digit's place: 22.86 by 1, 180 by 10, 3 by 0.1; nothing is spun by 1. */
function stepOf(value: number): number {
  return value === 0 || !Number.isFinite(value) ? 1 : 10 ** (Math.floor(Math.log10(Math.abs(value)) + 1e-9) - 1);
}

/** How a text is spun, fixed when spinning begins, so that 10 down and up again is 10. */
export interface Spin {
  /** In the unit the value is written in, or SI for an expression. */
  readonly step: number;
  readonly plain: boolean;
}

export function makeSpin(text: string, dimension: Dimension, values: NamedValues): Spin | null {
  const plain = PLAIN.exec(text);
  const read = parseQuantity(text, dimension, values);
  if (!read.ok) return null;
  return plain === null ? { step: stepOf(read.value), plain: false } : { step: stepOf(Number(plain[1])), plain: true };
}

/** Digits that hide the noise of adding decimals. */
const DIGITS = 12;

/** The text spun by `steps` steps; the unit and the expression stay as written. */
export function spinText(text: string, dimension: Dimension, spin: Spin, steps: number): string {
  const plain = PLAIN.exec(text);
  if (plain === null || !spin.plain) return shiftQuantity(text, spin.step * steps, dimension);
  const value = Number(plain[1]) + spin.step * steps;
  const tidy = Math.abs(value) < spin.step * 1e-6 ? 0 : Number(value.toPrecision(DIGITS));
  return `${tidy}${plain[2] === '' ? '' : ` ${plain[2]}`}`;
}

/** Shift takes ten steps at a time, Alt a tenth of one. */
export function spinSteps(press: { readonly key: string; readonly shiftKey: boolean; readonly altKey: boolean }): number {
  const direction = press.key === 'ArrowUp' ? 1 : press.key === 'ArrowDown' ? -1 : 0;
  return direction * (press.shiftKey ? 10 : press.altKey ? 0.1 : 1);
}
