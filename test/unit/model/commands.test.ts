import { describe, expect, it } from 'vitest';
import { applyCommand } from '../../../src/model/commands.ts';
import type { Command } from '../../../src/model/commands.ts';
import { describeCommand } from '../../../src/model/describe-command.ts';
import {
  bailOut,
  closeStep,
  makeHistory,
  recordEdit,
  redoEdit,
  redoLabel,
  undoEdit,
  undoLabel,
} from '../../../src/model/history.ts';
import type { Job } from '../../../src/model/job.ts';
import { makeEmptyJob, makePart, makeProbe } from '../../../src/model/new-job.ts';
import { makeFullJob } from '../../fixtures/full-job.ts';

const full = makeFullJob();

function apply(job: Job, command: Command): Job {
  const result = applyCommand(job, command);
  if (!result.ok) throw new Error(JSON.stringify(result.errors));
  return result.value;
}

function refusal(job: Job, command: Command) {
  const result = applyCommand(job, command);
  if (result.ok) throw new Error('The command was accepted.');
  return result.errors[0];
}

describe('setting a value', () => {
  it('changes that value and keeps the identity of everything else', () => {
    const job = apply(full, { do: 'set', path: ['parts', 2, 'radius'], value: '3 mm' });
    expect(job.parts[2]).toMatchObject({ radius: '3 mm' });
    expect(job.parts[1]).toBe(full.parts[1]);
    expect(job.sheet).toBe(full.sheet);
  });

  it('to what it is gives the very same job', () => {
    const settled = apply(full, { do: 'set', path: ['title'], value: 'x' });
    expect(apply(settled, { do: 'set', path: ['title'], value: 'x' })).toBe(settled);
  });

  it('that cannot be read is refused with its path', () => {
    expect(refusal(full, { do: 'set', path: ['parts', 2, 'radius'], value: '3,5 mm' })).toMatchObject({
      path: 'parts[2].radius',
    });
    expect(refusal(full, { do: 'set', path: ['parts', 99, 'radius'], value: '3 mm' })).toMatchObject({ path: 'parts[99]' });
    expect(refusal(full, { do: 'set', path: ['__proto__', 'x'], value: 1 })).toMatchObject({ code: 'path' });
    expect(refusal(full, { do: 'set', path: ['parts', 2, 'radius'], value: undefined })).toMatchObject({
      path: 'parts[2].radius',
    });
    expect(refusal(full, { do: 'set', path: [], value: 3 }).hint).toBeTruthy();
  });

  it('lets the band be typed one end at a time, even past the other', () => {
    expect(apply(full, { do: 'set', path: ['band', 'from'], value: '20 GHz' }).band.from).toBe('20 GHz');
  });

  it('of an edge to or from repeating takes the opposite edge along', () => {
    const repeating = apply(makeEmptyJob(), { do: 'set', path: ['sheet', 'edges', 'left'], value: 'repeating' });
    expect(repeating.sheet.edges).toEqual({ left: 'repeating', right: 'repeating', bottom: 'absorbing', top: 'absorbing' });
    const back = apply(repeating, { do: 'set', path: ['sheet', 'edges', 'right'], value: 'metal' });
    expect(back.sheet.edges).toMatchObject({ left: 'metal', right: 'metal' });
  });

  it('of the section converts line currents, as the command for it does', () => {
    const job = apply(full, { do: 'set', path: ['section'], value: 'H out of plane' });
    expect(job.drives.map(({ amplitude }) => amplitude)).toEqual(['1 V/m', '20 mV', '1 V', '1 V']);
    expect(apply(job, { do: 'set section', section: 'E out of plane' }).drives).toEqual(full.drives);
  });

  it('of the section writes an amplitude that was an expression as its value', () => {
    const named = apply(full, { do: 'name value', name: 'i0', value: '10 mA' });
    const place = { do: 'set', path: ['drives', 1, 'amplitude'], value: '2*i0' } as const;
    expect(apply(apply(named, place), { do: 'set section', section: 'H out of plane' }).drives[1]?.amplitude).toBe('20 mV');
  });
});

describe('things', () => {
  it('are added at a place in the painting order', () => {
    const item = makePart(full, 'disc', 'ptfe', { centre: ['1 mm', '1 mm'], radius: '1 mm' });
    expect(apply(full, { do: 'add', list: 'parts', item, at: 1 }).parts[1]?.id).toBe(item.id);
    expect(apply(full, { do: 'add', list: 'parts', item }).parts.at(-1)?.id).toBe(item.id);
  });

  it('with an id that is taken are refused', () => {
    expect(refusal(full, { do: 'add', list: 'probes', item: { ...makeProbe(full, ['0', '0']), id: 'post' } })).toMatchObject({
      code: 'id',
    });
  });

  it('move by rewriting plain values in their unit and adding to expressions', () => {
    const job = apply(full, { do: 'move', ids: ['plate', 'post', 'p2', 'wave'], dxMetres: 0.00254, dyMetres: 0 });
    expect(job.parts[1]).toMatchObject({ from: ['102.54 mm', '10 mm'], to: ['a + 92.54 mm', '20 mm'] });
    expect(job.probes[1]?.at).toEqual(['-7.46 mm', '2*a']);
    expect(job.drives[0]).toBe(full.drives[0]);
  });

  it('are duplicated right above their originals with ids and names of their own', () => {
    const job = apply(full, { do: 'duplicate', ids: ['wall-1', 'post', 'p1'], dxMetres: 0.001, dyMetres: 0 });
    expect(job.parts.map(({ name }) => name)).toEqual(['Wall A', 'Wall B', 'Plate', 'Post', 'Post copy', 'Bend', 'Wedge', 'Rub']);
    expect(job.parts[1]).toMatchObject({ id: 'wall-2', thickness: '2 mm' });
    expect(job.probes.map(({ name }) => name)).toEqual(['Probe 1', 'Probe 3', 'Probe 2']);
  });

  it('are put in the place of their former selves, even as another kind', () => {
    const item = makePart(full, 'rectangle', 'ptfe', { from: ['0 mm', '0 mm'], to: ['5 mm', '5 mm'] });
    expect(apply(full, { do: 'put', item: { ...item, id: 'post' } }).parts[2]).toMatchObject({ kind: 'rectangle', id: 'post' });
    expect(refusal(full, { do: 'put', item: { ...item, id: 'gone' } })).toMatchObject({ code: 'id' });
  });

  it('are reordered to the place asked for', () => {
    const order = (to: number) => apply(full, { do: 'reorder', id: 'post', to }).parts.findIndex(({ id }) => id === 'post');
    expect([order(0), order(4), order(99)]).toEqual([0, 4, 5]);
  });

  it('that are gone cannot be removed again', () => {
    const job = apply(full, { do: 'remove', ids: ['post', 'p1'] });
    expect(job.parts).toHaveLength(5);
    expect(job.probes).toHaveLength(1);
    expect(refusal(job, { do: 'remove', ids: ['post'] })).toMatchObject({ code: 'id' });
  });

  it('do not lose the material they are made of', () => {
    expect(refusal(full, { do: 'remove', ids: ['filler'] }).message).toBe('Filler cannot be removed: Plate is made of it.');
    expect(apply(full, { do: 'remove', ids: ['filler', 'plate'] }).materials).toEqual([]);
  });
});

describe('named values', () => {
  it('in use cannot lose their name', () => {
    expect(refusal(full, { do: 'unname value', name: 'top' })).toMatchObject({ path: 'band.to' });
    expect(refusal(full, { do: 'unname value', name: 'a' })).toMatchObject({ path: 'values.gap' });
  });

  it('keep their order when one changes', () => {
    expect(Object.keys(apply(full, { do: 'name value', name: 'a', value: '1 in' }).values)).toEqual(['a', 'top', 'gap']);
  });

  it('take another name wherever they are used, in one step, and words stay as they are', () => {
    const titled = { ...full, title: 'a slot in a wall', notes: 'a and gap' };
    const renamed = apply(titled, { do: 'rename value', name: 'a', to: 'broad' });
    expect(Object.keys(renamed.values)).toEqual(['broad', 'top', 'gap']);
    expect(renamed.values['gap']).toBe(full.values['gap']!.replace(/\ba\b/, 'broad'));
    expect(JSON.stringify(renamed)).not.toMatch(/"[^"]*\ba\/2[^"]*"/);
    expect([renamed.title, renamed.notes]).toEqual([titled.title, titled.notes]);
    expect(apply(renamed, { do: 'rename value', name: 'broad', to: 'a' })).toEqual(titled);
  });

  it('cannot take a name that is taken, or that is none', () => {
    expect(refusal(full, { do: 'rename value', name: 'a', to: 'gap' })).toMatchObject({ code: 'name', path: 'values.gap' });
    expect(refusal(full, { do: 'rename value', name: 'a', to: '3x' })).toBeDefined();
    expect(refusal(full, { do: 'rename value', name: 'nobody', to: 'b' })).toMatchObject({ code: 'name' });
  });

  it('that would go round in a circle are refused', () => {
    expect(refusal(full, { do: 'name value', name: 'a', value: '4*gap' })).toMatchObject({ code: 'cycle' });
  });
});

describe('another document', () => {
  it('replaces the job when it is valid', () => {
    expect(apply(full, { do: 'replace', job: makeEmptyJob() })).toEqual(makeEmptyJob());
    expect(refusal(full, { do: 'replace', job: { ...makeEmptyJob(), title: 'a\nb' } })).toMatchObject({ path: 'title' });
  });
});

describe('words for edits', () => {
  const cases: [Command, string][] = [
    [{ do: 'move', ids: ['wall-1'], dxMetres: 0, dyMetres: 0 }, 'move Wall A'],
    [{ do: 'remove', ids: ['wall-1', 'p1'] }, 'remove Wall A and Probe 1'],
    [{ do: 'remove', ids: ['wall-1', 'p1', 'p2'] }, 'remove Wall A and 2 more'],
    [{ do: 'set', path: ['parts', 0, 'thickness'], value: '' }, 'change Wall A, thickness'],
    [{ do: 'set', path: ['sheet', 'edges', 'left'], value: '' }, 'change the left edge'],
    [{ do: 'set', path: ['band', 'from'], value: '' }, 'change the band'],
    [{ do: 'name value', name: 'a', value: '' }, 'change a'],
    [{ do: 'name value', name: 'b', value: '' }, 'name b'],
    [{ do: 'replace', job: makeEmptyJob() }, 'open Untitled'],
  ];
  it.each(cases)('%j', (command, words) => {
    expect(describeCommand(full, command)).toBe(words);
  });
});

describe('history', () => {
  const drag = { kind: 'join', key: 'drag' } as const;
  const a = full;
  const b = { ...full, title: 'b' };
  const c = { ...full, title: 'c' };

  it('takes a drag back in one step', () => {
    const history = recordEdit(recordEdit(makeHistory(), a, 'move', drag), b, 'move', drag);
    expect(undoEdit(history, c)?.job).toBe(a);
  });

  it('keeps two drags apart when the first is closed', () => {
    const first = closeStep(recordEdit(makeHistory(), a, 'move', drag));
    expect(undoEdit(recordEdit(first, b, 'move', drag), c)?.job).toBe(b);
  });

  it('does not join a step that was undone and redone', () => {
    const undone = undoEdit(recordEdit(makeHistory(), a, 'move', drag), b);
    const redone = undone && redoEdit(undone.history, undone.job);
    expect(redone?.job).toBe(b);
    const again = redone && recordEdit(redone.history, b, 'move', drag);
    expect(again && undoEdit(again, c)?.job).toBe(b);
  });

  it('forgets what could be redone after a new edit, and gives it back when that edit is bailed out of', () => {
    const undone = undoEdit(recordEdit(makeHistory(), a, 'rename', { kind: 'record' }), b);
    if (undone === null) throw new Error('Nothing to undo.');
    expect(redoLabel(undone.history)).toBe('rename');
    const dragged = recordEdit(undone.history, a, 'move', drag);
    expect(redoLabel(dragged)).toBeNull();
    const bailed = bailOut(dragged, 'drag');
    expect(bailed?.job).toBe(a);
    expect(bailed && redoLabel(bailed.history)).toBe('rename');
    expect(bailOut(dragged, 'other')).toBeNull();
  });

  it('does not hold what is loaded at the start', () => {
    const history = recordEdit(makeHistory(), a, 'open', { kind: 'skip' });
    expect(undoLabel(history)).toBeNull();
    expect(undoEdit(history, b)).toBeNull();
  });
});
