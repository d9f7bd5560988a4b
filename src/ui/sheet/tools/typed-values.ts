// Owns the text a person types while drawing: keys into fields, fields into numbers.
// Must not know the DOM, stores, or what is being drawn.
import { parseQuantity } from '../../../base/quantity.ts';
import type { ToolContext } from './tool.ts';

export interface TypedState {
  readonly texts: readonly string[];
  readonly active: number;
}

export const NOTHING_TYPED: TypedState = { texts: [], active: 0 };

/** Starts a number; other characters belong to shortcuts until something is typed. */
const STARTS_A_NUMBER = /^[0-9.,(+\-−]$/;

const LONGEST_TEXT = 60;

export function isTyping(typed: TypedState): boolean {
  return typed.texts.some((text) => text !== '');
}

/** The fields after a key, or null when the key is not for them. */
export function typeKey(typed: TypedState, key: string, shift: boolean, fieldCount: number): TypedState | null {
  const now = typed.texts[typed.active] ?? '';
  if (key === 'Tab') return { ...typed, active: (typed.active + (shift ? fieldCount - 1 : 1)) % fieldCount };
  if (key === 'Backspace') return now === '' ? null : withText(typed, now.slice(0, -1));
  if (key.length !== 1) return null;
  if (now === '' ? !STARTS_A_NUMBER.test(key) : now.length >= LONGEST_TEXT) return null;
  return withText(typed, now + (key === '−' ? '-' : key));
}

function withText(typed: TypedState, text: string): TypedState {
  const texts = Array.from({ length: Math.max(typed.texts.length, typed.active + 1) }, (_, k) => typed.texts[k] ?? '');
  texts[typed.active] = text;
  return { ...typed, texts };
}

export type TypedKind = 'length' | 'angle';

/** What is typed in a field: nothing, a number in metres or radians, or why it is none. */
export type TypedValue =
  | { readonly kind: 'nothing' }
  | { readonly kind: 'value'; readonly value: number; readonly text: string }
  | { readonly kind: 'wrong'; readonly message: string };

/** Bare numbers take the unit of the ruler, or degrees; a decimal comma is read as a point. */
export function readTyped(typed: TypedState, field: number, kind: TypedKind, { job, unit }: ToolContext): TypedValue {
  const raw = (typed.texts[field] ?? '').trim();
  if (raw === '') return { kind: 'nothing' };
  const bare = /^[-+]?(\d+[.,]?\d*|[.,]\d+)$/.test(raw);
  const text = bare ? `${raw.replace(',', '.')} ${kind === 'angle' ? 'deg' : unit.name}` : raw;
  const result = parseQuantity(text, kind, job.values);
  if (result.ok) return { kind: 'value', value: result.value, text };
  const [error] = result.errors;
  return { kind: 'wrong', message: error.hint === undefined ? error.message : `${error.message} ${error.hint}` };
}
