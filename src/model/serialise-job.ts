// Owns the text of a job document: the Brief's order of keys, two-space indents, short lists on one line.
// Must not know files.
import type { Job } from './job.ts';

/** Longest list or object written on one line. */
const LINE_WIDTH = 110;

const KEY_ORDER: readonly (keyof Job)[] = [
  'guidewall',
  'title',
  'notes',
  'section',
  'band',
  'sheet',
  'grid',
  'values',
  'materials',
  'parts',
  'drives',
  'probes',
  'reference',
  'stop',
];

const INNER_ORDER: readonly string[] = [
  'id',
  'name',
  'kind',
  'material',
  'leftOutOfReference',
  'centre',
  'at',
  'from',
  'to',
  'points',
  'listed',
  'width',
  'height',
  'origin',
  'background',
  'edges',
  'left',
  'right',
  'bottom',
  'top',
  'inner',
  'outer',
  'radius',
  'thickness',
  'amplitude',
  'angle',
  'waveform',
];

function orderKeys(value: object): string[] {
  const rank = (key: string): number => {
    const place = INNER_ORDER.indexOf(key);
    return place < 0 ? INNER_ORDER.length : place;
  };
  return Object.keys(value).toSorted((a, b) => rank(a) - rank(b) || (a < b ? -1 : 1));
}

function write(value: unknown, indent: string, keys?: readonly string[]): string {
  if (typeof value !== 'object' || value === null) return JSON.stringify(value);
  const list = Array.isArray(value);
  const inside = `${indent}  `;
  const writeItem = (key: string): string =>
    `${JSON.stringify(key)}: ${write((value as Record<string, unknown>)[key], inside, key === 'values' ? ownKeys(value, key) : undefined)}`;
  const items = list ? value.map((item: unknown) => write(item, inside)) : (keys ?? orderKeys(value)).map(writeItem);
  const [open, close, pad] = list ? ['[', ']', ''] : ['{', '}', ' '];
  if (items.length === 0) return open + close;
  const line = `${open}${pad}${items.join(', ')}${pad}${close}`;
  const fits = keys !== KEY_ORDER && line.length <= LINE_WIDTH - indent.length && !line.includes('\n');
  return fits ? line : `${open}\n${items.map((item) => inside + item).join(',\n')}\n${indent}${close}`;
}

/** Named values keep the order the person gave them. (Samples have a list under the same key; lists have no order to keep.) */
function ownKeys(parent: object, key: string): readonly string[] | undefined {
  const inner: unknown = (parent as Record<string, unknown>)[key];
  return typeof inner === 'object' && inner !== null && !Array.isArray(inner) ? Object.keys(inner) : undefined;
}

/** The same job always gives the same text; `parseJob` of it gives the same job. Ends with a line break. */
export function serialiseJob(job: Job): string {
  return `${write(job, '', KEY_ORDER)}\n`;
}
