// Owns giving a named value another name, here and wherever it is used.
// Must not know history, stores, or the grammar of quantities.
import type { Result } from '../base/result.ts';
import { fail, ok } from '../base/result.ts';
import { renameInExpression } from '../base/expression.ts';
import type { Job } from './job.ts';

/** Texts under these keys are words, not quantities. */
const WORDS: ReadonlySet<string> = new Set([
  'title',
  'notes',
  'name',
  'id',
  'kind',
  'material',
  'section',
  'background',
  'edges',
  'reference',
]);

/** Whether the new name is good is judged with the job it makes. */
export function renameValue(job: Job, from: string, to: string): Result<Job> {
  if (!Object.hasOwn(job.values, from)) {
    return fail({
      code: 'name',
      path: 'values',
      message: `There is no value named "${from}".`,
      hint: 'Choose one of those listed.',
    });
  }
  if (from !== to && Object.hasOwn(job.values, to)) {
    return fail({
      code: 'name',
      path: `values.${to}`,
      message: `Another value is named "${to}" already.`,
      hint: 'Choose a name that is free.',
    });
  }
  const values = Object.fromEntries(Object.entries(job.values).map(([name, text]) => [name === from ? to : name, text]));
  return ok(renameUnder({ ...job, values }, from, to) as Job);
}

/** What holds no such name keeps its identity. */
function renameUnder(value: unknown, from: string, to: string): unknown {
  if (typeof value === 'string') return renameInExpression(value, from, to);
  if (Array.isArray(value)) {
    const items: unknown[] = value.map((item) => renameUnder(item, from, to));
    return items.every((item, k) => item === value[k]) ? value : items;
  }
  if (typeof value !== 'object' || value === null) return value;
  const entries = Object.entries(value);
  const renamed = entries.map(([key, item]): [string, unknown] => [key, WORDS.has(key) ? item : renameUnder(item, from, to)]);
  return renamed.every(([, item], k) => item === entries[k]![1]) ? value : Object.fromEntries(renamed);
}
