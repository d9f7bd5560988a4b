import { beforeEach, expect, test } from 'vitest';
import { lineStyleOfKept, CURRENT_LINE } from '../../../src/app/line-styles.ts';
import { useNoticeStore } from '../../../src/app/notice-store.ts';
import { describeKept, keepRun, overlayKept, removeKept, renameKept } from '../../../src/app/run-book.ts';
import { useRunStore } from '../../../src/app/run-store.ts';
import { makeRecord } from './fake-solver.ts';
import { makeSmallJob } from './small-job.ts';

const kept = () => useRunStore.getState().kept;

function show(w: string): void {
  useRunStore.setState({ main: makeRecord('main'), answeredJob: { ...makeSmallJob(), values: { w } } });
}

beforeEach(() => {
  useRunStore.setState({ main: null, reference: null, answeredJob: null, kept: [] });
  useNoticeStore.setState({ notices: [] });
});

test('nothing is kept before a run has ended', () => {
  keepRun();
  expect(kept()).toEqual([]);
});

test('a kept run is called by what changed since the one before', () => {
  show('3 mm');
  keepRun();
  show('5 mm');
  keepRun();
  expect(kept().map((run) => run.name)).toEqual(['Small', 'w 3 mm to 5 mm']);
  expect(describeKept(kept(), 'run-1')).toBeNull();
  expect(describeKept(kept(), 'run-2')).toBe('w 3 mm to 5 mm');
});

test('an empty name leaves the old one, a good one replaces it', () => {
  show('3 mm');
  keepRun('First');
  renameKept('run-1', '   ');
  expect(kept()[0]?.name).toBe('First');
  renameKept('run-1', ' Slot of 3 mm ');
  expect(kept()[0]?.name).toBe('Slot of 3 mm');
});

test('overlaying changes the one run asked for', () => {
  show('3 mm');
  keepRun();
  keepRun();
  overlayKept('run-1', false);
  expect(kept().map((run) => run.overlaid)).toEqual([false, true]);
});

test('a removed run is put back where it stood by its notice', () => {
  show('3 mm');
  keepRun('First');
  keepRun('Second');
  removeKept('run-1');
  expect(kept().map((run) => run.name)).toEqual(['Second']);
  useNoticeStore.getState().notices[0]?.action?.run();
  expect(kept().map((run) => run.name)).toEqual(['First', 'Second']);
});

test('a run put back beside one that took its id keeps both apart', () => {
  show('3 mm');
  keepRun('First');
  removeKept('run-1');
  keepRun('Second');
  useNoticeStore.getState().notices[0]?.action?.run();
  expect(new Set(kept().map((run) => run.id)).size).toBe(2);
});

test('kept runs differ from the run on show and from their neighbours in colour and in dash', () => {
  const styles = [CURRENT_LINE, ...['run-1', 'run-2', 'run-3', 'run-4', 'run-5'].map(lineStyleOfKept)];
  expect(new Set(styles.map((style) => style.colour)).size).toBe(6);
  expect(new Set(styles.map((style) => style.dash.join(' '))).size).toBe(6);
});
