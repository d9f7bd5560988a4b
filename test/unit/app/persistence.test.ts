import { afterEach, beforeEach, expect, test, vi } from 'vitest';
import { useJobStore } from '../../../src/app/job-store.ts';
import { useNoticeStore } from '../../../src/app/notice-store.ts';
import { restore, Saver } from '../../../src/app/persistence.ts';
import type { KeptRun } from '../../../src/app/run-store.ts';
import { useRunStore } from '../../../src/app/run-store.ts';
import type { LastWords, Shelf } from '../../../src/app/shelf.ts';
import { serialiseJob } from '../../../src/model/serialise-job.ts';
import { makeRecord } from './fake-solver.ts';
import { makeSmallJob } from './small-job.ts';

/** A shelf in memory that copies what it is given, as IndexedDB does. */
function makeShelf(): Shelf & { readonly things: Map<string, unknown>; writes: number; full: boolean } {
  const things = new Map<string, unknown>();
  const shelf = {
    things,
    writes: 0,
    full: false,
    get: async (key: string) => structuredClone(things.get(key)),
    set: async (key: string, value: unknown) => {
      if (shelf.full) throw new Error('quota exceeded');
      shelf.writes += 1;
      things.set(key, structuredClone(value));
    },
    del: async (key: string) => void things.delete(key),
    keys: async () => [...things.keys()],
  };
  return shelf;
}

let noted: string | null = null;
const note: LastWords = { read: () => noted, write: (text) => void (noted = text) };

const NOTHING = { job: null, kept: [], troubles: [] };

function makeKept(id: string, name = 'First'): KeptRun {
  const job = makeSmallJob();
  return {
    id,
    name,
    keptAt: '2026-01-01T00:00:00.000Z',
    job,
    main: makeRecord('main'),
    reference: makeRecord('reference'),
    overlaid: true,
  };
}

let detach = (): void => undefined;

beforeEach(() => {
  vi.useFakeTimers();
  noted = null;
  useJobStore.getState().dispatch({ do: 'replace', job: makeSmallJob() }, { kind: 'skip' });
  useRunStore.setState({ kept: [] });
  useNoticeStore.setState({ notices: [] });
});

afterEach(() => {
  detach();
  vi.useRealTimers();
});

test('an edit is on the shelf within 400 ms, also while edits keep coming', async () => {
  const shelf = makeShelf();
  detach = new Saver(shelf, note).attach(NOTHING);
  for (let k = 0; k < 7; k += 1) {
    useJobStore.getState().dispatch({ do: 'set', path: ['title'], value: `Edit ${k}` });
    await vi.advanceTimersByTimeAsync(100);
  }
  expect(shelf.writes).toBeGreaterThanOrEqual(1);
  expect(useJobStore.getState().saved).toBe('saving');
  await vi.advanceTimersByTimeAsync(400);
  expect((await restore(shelf, note)).job?.title).toBe('Edit 6');
  expect(useJobStore.getState().saved).toBe('saved');
});

test('leaving the page writes what was not written yet', async () => {
  const shelf = makeShelf();
  const saver = new Saver(shelf, note);
  detach = saver.attach(NOTHING);
  useJobStore.getState().dispatch({ do: 'set', path: ['title'], value: 'Last words' });
  await saver.flush();
  expect((await restore(shelf, note)).job?.title).toBe('Last words');
});

test('an edit made in the last moment comes back from the note, and the note goes once it is on the shelf', async () => {
  const shelf = makeShelf();
  const saver = new Saver(shelf, note);
  detach = saver.attach(NOTHING);
  await saver.flush();
  useJobStore.getState().dispatch({ do: 'set', path: ['title'], value: 'Last moment' });
  shelf.full = true;
  saver.leave();
  await vi.advanceTimersByTimeAsync(10);
  shelf.full = false;
  const back = await restore(shelf, note);
  expect(back.job?.title).toBe('Last moment');
  const next = new Saver(shelf, note);
  const end = next.attach(back);
  await next.flush();
  end();
  expect(noted).toBeNull();
  expect((await restore(shelf, note)).job?.title).toBe('Last moment');
});

test('a note that cannot be read leaves the shelf to speak', async () => {
  const shelf = makeShelf();
  shelf.things.set('job', serialiseJob(makeSmallJob()));
  noted = '{"guidewall": 1';
  expect((await restore(shelf, note)).job?.title).toBe('Small');
});

test('a kept run comes back whole, records and all', async () => {
  const shelf = makeShelf();
  const saver = new Saver(shelf, note);
  detach = saver.attach(NOTHING);
  const run = makeKept('run-1');
  useRunStore.setState({ kept: [run] });
  await saver.flush();
  const back = await restore(shelf, note);
  expect(back.troubles).toEqual([]);
  expect(back.kept).toEqual([run]);
});

test('renaming one run writes that one alone, and removing it takes it off the shelf', async () => {
  const shelf = makeShelf();
  const saver = new Saver(shelf, note);
  detach = saver.attach(NOTHING);
  const runs = [makeKept('run-1'), makeKept('run-2', 'Second')];
  useRunStore.setState({ kept: runs });
  await saver.flush();
  const before = shelf.writes;
  useRunStore.setState({ kept: runs.map((run) => (run.id === 'run-2' ? { ...run, name: 'Renamed' } : run)) });
  await saver.flush();
  expect(shelf.writes).toBe(before + 1);
  useRunStore.setState({ kept: runs.slice(0, 1) });
  await saver.flush();
  expect((await restore(shelf, note)).kept.map((run) => run.id)).toEqual(['run-1']);
});

test('a job that cannot be read is put aside, told, and does not block the start', async () => {
  const shelf = makeShelf();
  shelf.things.set('job', serialiseJob(makeSmallJob()).slice(0, 200));
  const back = await restore(shelf, note);
  expect(back.job).toBeNull();
  expect(back.troubles[0]?.message).toContain('JSON');
  const aside = [...shelf.things.keys()].filter((key) => key.startsWith('aside'));
  expect(aside).toHaveLength(1);
  expect(shelf.things.has('job')).toBe(false);
});

test.each([
  ['no object', 'rubbish'],
  ['a job that is none', { ...makeKept('run-1'), job: { guidewall: 1 } }],
  ['a record without its samples', { ...makeKept('run-1'), main: { ...makeRecord('main'), traces: [{ probeId: 'probe-1' }] } }],
  [
    'a spectrum of another length',
    { ...makeKept('run-1'), main: { ...makeRecord('main'), frequenciesHertz: Float64Array.of(1) } },
  ],
])('a kept run with %s is put aside and the others come back', async (_, broken) => {
  const shelf = makeShelf();
  shelf.things.set('run run-1', broken);
  shelf.things.set('run run-2', makeKept('run-2', 'Good'));
  const back = await restore(shelf, note);
  expect(back.kept.map((run) => run.name)).toEqual(['Good']);
  expect(back.troubles).toHaveLength(1);
  expect([...shelf.things.keys()].some((key) => key.startsWith('aside'))).toBe(true);
});

test('a browser that keeps nothing is told once, and work goes on', async () => {
  const shelf = makeShelf();
  shelf.full = true;
  detach = new Saver(shelf, note).attach(NOTHING);
  for (const title of ['One', 'Two']) {
    useJobStore.getState().dispatch({ do: 'set', path: ['title'], value: title });
    await vi.advanceTimersByTimeAsync(500);
  }
  expect(useJobStore.getState().saved).toBe('not saved');
  expect(useNoticeStore.getState().notices).toHaveLength(1);
  shelf.full = false;
  useJobStore.getState().dispatch({ do: 'set', path: ['title'], value: 'Three' });
  await vi.advanceTimersByTimeAsync(500);
  expect((await restore(shelf, note)).job?.title).toBe('Three');
  expect(useJobStore.getState().saved).toBe('saved');
});

test('a shelf that cannot be read at all still lets the program start', async () => {
  const shelf: Shelf = {
    get: () => Promise.reject(new Error('no storage')),
    set: () => Promise.reject(new Error('no storage')),
    del: () => Promise.reject(new Error('no storage')),
    keys: () => Promise.reject(new Error('no storage')),
  };
  const back = await restore(shelf, note);
  expect(back).toMatchObject({ job: null, kept: [] });
  expect(back.troubles[0]?.code).toBe('storage');
});
