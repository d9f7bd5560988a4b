// Owns turning what the schema finds into errors a person can act on: path, value, mend.
// Must not know the schema itself.
import type { z } from 'zod/mini';
import type { AppError } from '../base/result.ts';
import { findNearestWord } from '../base/nearest-word.ts';
import { writePath } from './plain-data.ts';

type Issue = z.core.$ZodIssue;

const TYPE_NAMES: Readonly<Record<string, string>> = {
  string: 'a text',
  number: 'a number',
  int: 'a whole number',
  boolean: 'true or false',
  array: 'a list',
  tuple: 'a list',
  object: 'an object',
  record: 'an object',
};

/** The value as it would be written, shortened. */
function show(value: unknown): string {
  const text = JSON.stringify(value) ?? 'nothing';
  return text.length > 60 ? `${text.slice(0, 57)}...` : text;
}

function valueAt(root: unknown, path: readonly PropertyKey[]): unknown {
  return path.reduce<unknown>((value, step) => {
    const inside = typeof value === 'object' && value !== null && Object.hasOwn(value, step);
    return inside ? (value as Record<PropertyKey, unknown>)[step] : undefined;
  }, root);
}

function listWords(words: readonly unknown[]): string {
  const shown = words.map((word) => (typeof word === 'string' ? `"${word}"` : String(word)));
  return shown.length < 2 ? shown.join('') : `${shown.slice(0, -1).join(', ')} or ${shown.at(-1)}`;
}

function describeChoice(value: unknown, choices: readonly unknown[]): Pick<AppError, 'message' | 'hint'> {
  const texts = choices.filter((choice): choice is string => typeof choice === 'string');
  const nearest = typeof value === 'string' ? findNearestWord(value, texts) : undefined;
  const message = value === undefined ? 'This is missing.' : `${show(value)} is not known here.`;
  return {
    message,
    hint: nearest === undefined ? `Use ${listWords(choices)}.` : `Did you mean "${nearest}"? Use ${listWords(choices)}.`,
  };
}

function describeBound(
  issue: Issue & { readonly code: 'too_small' | 'too_big' },
  value: unknown,
): Pick<AppError, 'message' | 'hint'> {
  const limit = issue.code === 'too_small' ? issue.minimum : issue.maximum;
  const side = issue.code === 'too_small' ? 'least' : 'most';
  const exact = issue.exact === true;
  if (typeof value === 'number')
    return { message: `${show(value)} is out of range.`, hint: `Give a number of at ${side} ${limit}.` };
  const unit = typeof value === 'string' ? 'characters' : 'entries';
  const length = typeof value === 'string' || Array.isArray(value) ? value.length : 0;
  return { message: `${show(value)} has ${length} ${unit}.`, hint: `Give ${exact ? 'exactly' : `at ${side}`} ${limit}.` };
}

function describeType(expected: string, value: unknown): Pick<AppError, 'message' | 'hint'> {
  const name = TYPE_NAMES[expected] ?? expected;
  if (value === undefined) return { message: 'This is missing.', hint: `Give ${name}.` };
  return { message: `${show(value)} is not ${name}.`, hint: `Give ${name}.` };
}

/** Our own messages come as two lines; the others are worded here. */
function wordIssue(issue: Issue, value: unknown): Pick<AppError, 'message' | 'hint'> {
  const [message = '', hint] = issue.message.split('\n');
  if (hint !== undefined) {
    if (issue.code === 'unrecognized_keys') return { message, hint };
    return { message: value === undefined ? 'This is missing.' : `${show(value)} ${message}`, hint };
  }
  switch (issue.code) {
    case 'invalid_key': {
      const [what = 'is not valid here.', mend = 'Choose another.'] = (issue.issues[0]?.message ?? '').split('\n');
      return { message: `${show(issue.path.at(-1))} ${what}`, hint: mend };
    }
    case 'invalid_type':
      return describeType(issue.expected, value);
    case 'invalid_value':
      return describeChoice(value, issue.values);
    case 'too_small':
    case 'too_big':
      return describeBound(issue, value);
    case 'invalid_union':
      return 'options' in issue && Array.isArray(issue.options)
        ? describeChoice(value, issue.options)
        : { message: `${show(value)} fits none of the forms known here.`, hint: 'Compare it with the published schema.' };
    default:
      return { message: `${show(value)} is not valid here.`, hint: 'Compare it with the published schema.' };
  }
}

/** In a union told apart by its keys, the form the person seems to have meant: the one with the fewest complaints inside. */
function narrowUnion(issue: Issue, value: unknown): readonly Issue[] {
  if (issue.code !== 'invalid_union' || issue.errors.length === 0 || typeof value !== 'object' || value === null) return [issue];
  const meant = issue.errors.find(
    (errors) => !errors.some((error) => error.code === 'unrecognized_keys' && error.path.length === 0),
  );
  if (meant === undefined || Object.keys(value).length === 0) return [issue];
  return meant.map((error) => ({ ...error, path: [...issue.path, ...error.path] }));
}

export function describeIssues(issues: readonly Issue[], root: unknown): AppError[] {
  return issues
    .flatMap((issue) => narrowUnion(issue, valueAt(root, issue.path)))
    .map((issue) => {
      const path = issue.code === 'unrecognized_keys' ? [...issue.path, issue.keys[0] ?? ''] : issue.path;
      return { code: 'form', path: writePath(path), ...wordIssue(issue, valueAt(root, issue.path)) };
    });
}
