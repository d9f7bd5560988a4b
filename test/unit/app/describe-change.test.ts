import { expect, test } from 'vitest';
import { describeChange, listChanges } from '../../../src/app/describe-change.ts';
import { applyCommand } from '../../../src/model/commands.ts';
import type { Command } from '../../../src/model/commands.ts';
import type { Job } from '../../../src/model/job.ts';
import { makeSmallJob } from './small-job.ts';

const BEFORE = makeSmallJob();

function after(...commands: Command[]): Job {
  return commands.reduce((job, command) => {
    const done = applyCommand(job, command);
    return done.ok ? done.value : expect.fail(done.errors[0].message);
  }, BEFORE);
}

test.each<[string, Command, string]>([
  ['a named value', { do: 'name value', name: 'w', value: '5 mm' }, 'w 3 mm to 5 mm'],
  ['a new name', { do: 'name value', name: 'h', value: '1 mm' }, 'h = 1 mm named'],
  ['a thickness', { do: 'set', path: ['parts', 0, 'thickness'], value: '1 mm' }, 'Wall A thickness 2 mm to 1 mm'],
  [
    'a place',
    { do: 'set', path: ['probes', 0, 'at'], value: ['100 mm', '45 mm'] },
    'Probe 1 at (150 mm, 45 mm) to (100 mm, 45 mm)',
  ],
  ['a mark', { do: 'set', path: ['parts', 1, 'leftOutOfReference'], value: true }, 'Board left out of the reference no to yes'],
  ['a removal', { do: 'remove', ids: ['board'] }, 'Board removed'],
  ['an addition', { do: 'add', list: 'probes', item: { id: 'p2', name: 'Probe 2', at: ['1 mm', '1 mm'] } }, 'Probe 2 added'],
  ['a new name of a part', { do: 'set', path: ['parts', 0, 'name'], value: 'Door' }, 'Wall A renamed Door'],
  ['the order', { do: 'reorder', id: 'board', to: 0 }, 'order of parts changed'],
  ['the section', { do: 'set section', section: 'H out of plane' }, 'E out of plane to H out of plane'],
  ['the band', { do: 'set', path: ['band', 'to'], value: '5 GHz' }, 'band to 6 GHz to 5 GHz'],
])('%s is told by name', (_, command, words) => {
  expect(listChanges(BEFORE, after(command))).toContain(words);
});

test('title and notes are no change', () => {
  expect(describeChange(BEFORE, after({ do: 'set', path: ['title'], value: 'Other' }))).toBeNull();
});

test('more than three changes are counted', () => {
  const many = after(
    { do: 'name value', name: 'w', value: '5 mm' },
    { do: 'remove', ids: ['board'] },
    { do: 'set', path: ['parts', 0, 'thickness'], value: '1 mm' },
    { do: 'set', path: ['band', 'from'], value: '2 GHz' },
    { do: 'set', path: ['band', 'to'], value: '5 GHz' },
  );
  expect(describeChange(BEFORE, many)).toMatch(/^w 3 mm to 5 mm; .*; 2 more$/);
});
