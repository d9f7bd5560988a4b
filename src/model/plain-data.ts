// Owns copying anything at all into plain JSON data of bounded size, or refusing it.
// Must not know jobs.
import type { AppError, Result } from '../base/result.ts';
import { fail, ok } from '../base/result.ts';

const DEEPEST = 12;
const MOST_ITEMS = 5_000_000;
const FORBIDDEN = new Set(['__proto__', 'constructor', 'prototype']);

interface Walk {
  items: number;
  trouble: AppError | null;
}

/** `parts[2].thickness` from its steps. */
export function writePath(steps: readonly PropertyKey[]): string {
  return steps.reduce<string>((path, step) => {
    if (typeof step === 'number') return `${path}[${step}]`;
    return path === '' ? String(step) : `${path}.${String(step)}`;
  }, '');
}

function refuse(walk: Walk, path: readonly PropertyKey[], message: string, hint: string): undefined {
  walk.trouble ??= { code: 'form', path: writePath(path), message, hint };
  return undefined;
}

function copy(value: unknown, path: readonly PropertyKey[], walk: Walk): unknown {
  walk.items += 1;
  if (walk.trouble !== null) return undefined;
  if (walk.items > MOST_ITEMS) return refuse(walk, [], `The document has more than ${MOST_ITEMS} entries.`, 'Split it.');
  if (value === null || typeof value === 'string' || typeof value === 'boolean') return value;
  if (typeof value === 'number') {
    return Number.isFinite(value) ? value : refuse(walk, path, `${value} is not a finite number.`, 'Give a finite number.');
  }
  if (typeof value !== 'object')
    return refuse(walk, path, `A ${typeof value} cannot stand in a job.`, 'Use texts, numbers, lists and objects.');
  if (path.length >= DEEPEST)
    return refuse(walk, path, `The document is nested more than ${DEEPEST} deep.`, 'No job is; check the brackets.');
  if (Array.isArray(value)) return Array.from(value, (item: unknown, k) => copy(item, [...path, k], walk));
  const result: Record<string, unknown> = {};
  for (const [key, item] of Object.entries(value)) {
    if (FORBIDDEN.has(key)) return refuse(walk, [...path, key], `The key "${key}" is not allowed.`, 'Remove it.');
    if (item !== undefined) result[key] = copy(item, [...path, key], walk);
  }
  return result;
}

/** A private copy made of plain objects, lists, texts, finite numbers, booleans and null. Never throws. */
export function copyPlainData(value: unknown): Result<unknown> {
  const walk: Walk = { items: 0, trouble: null };
  try {
    const copied = copy(value, [], walk);
    return walk.trouble === null ? ok(copied) : fail(walk.trouble);
  } catch {
    // Only a getter or proxy of a hostile object gets here.
    return fail({ code: 'form', message: 'The document cannot be read through.', hint: 'Give plain JSON data.' });
  }
}
