import { beforeEach, expect, test } from 'vitest';
import { useJobStore } from '../../../src/app/job-store.ts';
import { makeSmallJob } from './small-job.ts';

const store = () => useJobStore.getState();

beforeEach(() => {
  store().dispatch({ do: 'replace', job: makeSmallJob() }, { kind: 'skip' });
});

test('an edit changes the job, its numbers and what undo would take back', () => {
  store().dispatch({ do: 'set', path: ['sheet', 'width'], value: '200 mm' });
  const { job, resolved, undoLabel } = store();
  expect(job.sheet.width).toBe('200 mm');
  expect(resolved.ok && resolved.value.sheet.widthMetres).toBeCloseTo(0.2, 12);
  expect(undoLabel).toContain('width');
});

test('undo and redo walk to the very same jobs', () => {
  const before = store().job;
  store().dispatch({ do: 'set', path: ['title'], value: 'Other' });
  const after = store().job;
  store().undo();
  expect(store().job).toBe(before);
  store().redo();
  expect(store().job).toBe(after);
});

test('edits of one key are one step back, those of another key are not', () => {
  const before = store().job;
  for (const value of ['201 mm', '202 mm', '203 mm']) {
    store().dispatch({ do: 'set', path: ['sheet', 'width'], value }, { kind: 'join', key: 'spin 1' });
  }
  const spun = store().job;
  store().dispatch({ do: 'set', path: ['sheet', 'width'], value: '204 mm' }, { kind: 'join', key: 'spin 2' });
  store().undo();
  expect(store().job).toBe(spun);
  store().undo();
  expect(store().job).toBe(before);
});

test('bailing out of a spin leaves the job, and what could be redone, as before it', () => {
  store().dispatch({ do: 'set', path: ['title'], value: 'Undone' });
  store().undo();
  const before = store().job;
  store().dispatch({ do: 'set', path: ['sheet', 'width'], value: '201 mm' }, { kind: 'join', key: 'spin 3' });
  store().bail('spin 3');
  expect(store().job).toBe(before);
  store().redo();
  expect(store().job.title).toBe('Undone');
});

test('a refused edit leaves the job alone and says why until the next good one', () => {
  const before = store().job;
  const refused = store().dispatch({ do: 'set', path: ['sheet', 'width'], value: '20 GHz' });
  expect(refused.ok).toBe(false);
  expect(store().job).toBe(before);
  expect(store().refusal?.path).toBe('sheet.width');
  store().dispatch({ do: 'set', path: ['title'], value: 'Good' });
  expect(store().refusal).toBeNull();
});

test('an edit that changes nothing is no step back', () => {
  store().dispatch({ do: 'set', path: ['title'], value: 'Once' });
  const label = store().undoLabel;
  store().dispatch({ do: 'set', path: ['sheet', 'width'], value: '180 mm' });
  expect(store().undoLabel).toBe(label);
});

test('what is loaded at the start cannot be undone', () => {
  while (store().canUndo) store().undo();
  store().dispatch({ do: 'replace', job: { ...makeSmallJob(), title: 'Restored' } }, { kind: 'skip' });
  expect(store().canUndo).toBe(false);
});
