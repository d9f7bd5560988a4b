// Owns the words for an edit, as the undo button says them: "move Wall A".
// Must not know how edits are made.
import type { Command } from './commands.ts';
import type { Job } from './job.ts';

function nameOf(job: Job, id: string): string {
  const thing = [...job.parts, ...job.drives, ...job.probes, ...job.materials].find((candidate) => candidate.id === id);
  return thing?.name ?? id;
}

function nameAll(job: Job, ids: readonly string[]): string {
  const [first = '', second = ''] = ids.map((id) => nameOf(job, id));
  if (ids.length < 2) return first;
  return ids.length === 2 ? `${first} and ${second}` : `${first} and ${ids.length - 1} more`;
}

const PLACES: Readonly<Record<string, string>> = {
  title: 'the title',
  notes: 'the notes',
  section: 'the section',
  band: 'the band',
  sheet: 'the sheet',
  grid: 'the grid',
  reference: 'the reference run',
  stop: 'when to stop',
  values: 'the named values',
};

const SHEET_PLACES: Readonly<Record<string, string>> = {
  width: 'the sheet\u2019s width',
  height: 'the sheet\u2019s height',
  origin: 'the origin',
  background: 'what fills the sheet',
};

function describePlace(job: Job, path: readonly (string | number)[]): string {
  const [first, second, third] = path;
  if (first === 'parts' || first === 'drives' || first === 'probes' || first === 'materials') {
    const thing = typeof second === 'number' ? job[first][second] : undefined;
    if (thing === undefined) return `the ${first}`;
    return typeof third === 'string' ? `${thing.name}, ${third === 'leftOutOfReference' ? 'the reference' : third}` : thing.name;
  }
  if (first === 'sheet' && second === 'edges' && typeof third === 'string') return `the ${third} edge`;
  if (first === 'sheet' && typeof second === 'string') return SHEET_PLACES[second] ?? 'the sheet';
  if (first === 'values' && typeof second === 'string') return second;
  return PLACES[String(first)] ?? 'the job';
}

/** `job` is the one before the command. */
export function describeCommand(job: Job, command: Command): string {
  switch (command.do) {
    case 'set':
      return `change ${describePlace(job, command.path)}`;
    case 'add':
      return `add ${command.item.name}`;
    case 'remove':
      return `remove ${nameAll(job, command.ids)}`;
    case 'put':
      return `change ${nameOf(job, command.item.id)}`;
    case 'move':
      return `move ${nameAll(job, command.ids)}`;
    case 'duplicate':
      return `duplicate ${nameAll(job, command.ids)}`;
    case 'reorder':
      return `reorder ${nameOf(job, command.id)}`;
    case 'name value':
      return `${Object.hasOwn(job.values, command.name) ? 'change' : 'name'} ${command.name}`;
    case 'unname value':
      return `remove the name ${command.name}`;
    case 'rename value':
      return `rename ${command.name} to ${command.to}`;
    case 'set section':
      return `turn the section to ${command.section}`;
    case 'replace':
      return `open ${command.job.title}`;
  }
}
