import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import { latestFrame, publishFrame } from '../../../src/app/frame-channel.ts';
import { useJobStore } from '../../../src/app/job-store.ts';
import { keepRun } from '../../../src/app/run-book.ts';
import { RunController } from '../../../src/app/run-controller.ts';
import { NO_PROGRESS, useRunStore } from '../../../src/app/run-store.ts';
import { useViewStore } from '../../../src/app/view-store.ts';
import { FakeSolver } from './fake-solver.ts';
import { makeSmallJob } from './small-job.ts';

const turn = (): Promise<void> => new Promise((resolve) => setTimeout(resolve, 0));
const settle = async (): Promise<void> => {
  for (let k = 0; k < 12; k += 1) await turn();
};
const run = () => useRunStore.getState();

/** The first solver asked for is the run's, the second the reference's. */
function makeBench(solvers: FakeSolver[]) {
  let clock = 0;
  const spawned: FakeSolver[] = [];
  const controller = new RunController({
    spawn: () => {
      const api = solvers[spawned.length] ?? new FakeSolver();
      spawned.push(api);
      return { api, close: () => (api.closed = true) };
    },
    nextFrame: turn,
    wait: turn,
    now: () => (clock += 30),
    threads: () => 4,
  });
  detach = controller.attach();
  return { controller, spawned };
}

let detach = (): void => undefined;

beforeEach(() => {
  useViewStore.getState().setFollows(false);
  useJobStore.getState().dispatch({ do: 'replace', job: makeSmallJob() }, { kind: 'skip' });
  useRunStore.setState({
    progress: NO_PROGRESS,
    estimate: null,
    errors: [],
    stale: false,
    liveTraces: [],
    liveCount: 0,
    main: null,
    reference: null,
    referenceState: 'none',
    answeredJob: null,
    kept: [],
  });
  useViewStore.setState({ field: 'Ez', fieldPlace: 'under' });
  publishFrame(null);
});

afterEach(() => detach());

test('a run ends with both records, all samples and the job they answer', async () => {
  const { controller } = makeBench([new FakeSolver(40), new FakeSolver(20)]);
  await controller.run();
  await settle();
  expect(run().progress.state).toBe('done');
  expect(run().main?.role).toBe('main');
  expect(run().reference?.role).toBe('reference');
  expect(run().referenceState).toBe('done');
  expect(run().answeredJob).toBe(useJobStore.getState().job);
  expect(run().liveCount).toBe(41);
  expect([...(run().liveTraces[0]?.samples[0] ?? [])].slice(0, 41)).toEqual(Array.from({ length: 41 }, (_, n) => n));
});

test('a run kept before its reference has ended gets the reference when it has', async () => {
  const { controller } = makeBench([new FakeSolver(20), new FakeSolver(4000)]);
  const going = controller.run();
  while (run().main === null) await turn();
  keepRun('early');
  expect(run().kept[0]?.reference).toBeNull();
  await going;
  while (run().referenceState !== 'done') await turn();
  expect(run().kept[0]?.reference?.role).toBe('reference');
});

test('there is never more than one look at the solver under way', async () => {
  const solver = new FakeSolver(400);
  const { controller } = makeBench([solver]);
  const going = controller.run();
  for (let k = 0; k < 8; k += 1) {
    useViewStore.getState().setField(k % 2 === 0 ? 'Hx' : 'Ez');
    await turn();
  }
  await controller.stop();
  await going;
  expect(solver.mostLooksAtOnce).toBe(1);
});

test('a moved wall that is left out of the reference does not run the reference again', async () => {
  const reference = new FakeSolver();
  const { controller } = makeBench([new FakeSolver(), reference]);
  await controller.run();
  await settle();
  const first = run().reference;
  useJobStore.getState().dispatch({ do: 'move', ids: ['wall-1'], dxMetres: 0.004, dyMetres: 0 });
  await controller.run();
  await settle();
  expect(reference.calls.filter((call) => call === 'open reference')).toHaveLength(1);
  expect(run().reference).toBe(first);
  useJobStore.getState().dispatch({ do: 'move', ids: ['board'], dxMetres: 0.004, dyMetres: 0 });
  await controller.run();
  await settle();
  expect(reference.calls.filter((call) => call === 'open reference')).toHaveLength(2);
});

test('a run shares the threads with the reference that goes beside it, and has them all when none does', async () => {
  const main = new FakeSolver();
  const reference = new FakeSolver();
  const { controller } = makeBench([main, reference]);
  await controller.run();
  await settle();
  useJobStore.getState().dispatch({ do: 'move', ids: ['wall-1'], dxMetres: 0.004, dyMetres: 0 });
  await controller.run();
  await settle();
  expect(main.threads).toEqual([2, 4]);
  expect(reference.threads).toEqual([2]);
});

test('without a part that is left out there is no reference run', async () => {
  useJobStore.getState().dispatch({ do: 'set', path: ['parts', 0, 'leftOutOfReference'], value: false });
  const { controller, spawned } = makeBench([]);
  await controller.run();
  await settle();
  expect(spawned).toHaveLength(1);
  expect(run().referenceState).toBe('none');
});

test('an edit makes the run stale and undoing it makes it fresh again; a new title does neither', async () => {
  const { controller } = makeBench([]);
  await controller.run();
  await settle();
  useJobStore.getState().dispatch({ do: 'set', path: ['title'], value: 'Renamed' });
  expect(run().stale).toBe(false);
  useJobStore.getState().dispatch({ do: 'set', path: ['band', 'to'], value: '5 GHz' });
  expect(run().stale).toBe(true);
  useJobStore.getState().undo();
  expect(run().stale).toBe(false);
});

test('an edit renews the estimate, and a job that cannot be run says why', async () => {
  makeBench([]);
  await settle();
  const before = run().estimate;
  expect(before?.cellsTotal).toBeGreaterThan(0);
  useJobStore.getState().dispatch({ do: 'set', path: ['sheet', 'width'], value: '240 mm' });
  await settle();
  expect(run().estimate?.cellsTotal).toBeGreaterThan(before?.cellsTotal ?? Infinity);
  useJobStore.getState().dispatch({ do: 'set', path: ['probes', 0, 'at'], value: ['900 mm', '0 mm'] });
  await settle();
  expect(run().estimate).toBeNull();
  expect(run().errors[0]?.path).toBe('probes[0].at');
  useJobStore.getState().undo();
  await settle();
  expect(run().errors).toEqual([]);
});

test('hold stops the stepping, one step makes one, and go on ends the run', async () => {
  const solver = new FakeSolver(400);
  const { controller } = makeBench([solver]);
  const going = controller.run();
  await turn();
  await controller.hold();
  await going;
  const held = run().progress;
  expect(held.state).toBe('held');
  await controller.stepOnce();
  expect(run().progress.step).toBe(held.step + 1);
  await controller.resume();
  await settle();
  expect(run().progress.state).toBe('done');
  expect(run().main?.steps).toBe(400);
});

test('back to t = 0 empties the traces and keeps the record', async () => {
  const { controller } = makeBench([]);
  await controller.run();
  await settle();
  const record = run().main;
  await controller.backToStart();
  expect(run().progress.step).toBe(0);
  expect(run().liveCount).toBe(1);
  expect(run().main).toBe(record);
});

test('stopping leaves the record of what there was', async () => {
  const { controller } = makeBench([new FakeSolver(100000, 1)]);
  const going = controller.run();
  await turn();
  await controller.stop();
  await going;
  expect(run().progress.state).toBe('done');
  expect(run().main?.stopReason).toBe('stopped by the person');
});

test('a reference run that was stopped is run again the next time', async () => {
  const reference = new FakeSolver(100000, 1);
  const { controller } = makeBench([new FakeSolver(100000, 1), reference]);
  const going = controller.run();
  await turn();
  await controller.stop();
  await going;
  await settle();
  void controller.run();
  await settle();
  expect(reference.calls.filter((call) => call === 'open reference')).toHaveLength(2);
});

test('a refused job is told with its path and no run begins', async () => {
  const solver = new FakeSolver();
  solver.openError = { code: 'drive in metal', message: 'Wave stands in metal.', path: 'wave', hint: 'Move it.' };
  const { controller } = makeBench([solver]);
  await controller.run();
  expect(run().errors.some((error) => error.path === 'wave')).toBe(true);
  expect(solver.calls).not.toContain('start');
});

test('a solver that dies is told in words, loses nothing, and the next run gets another', async () => {
  const first = new FakeSolver(100000, 1);
  const { controller, spawned } = makeBench([new FakeSolver()]);
  await controller.run();
  await settle();
  const record = run().main;
  detach();
  const next = makeBench([first]);
  const going = next.controller.run();
  await turn();
  first.dead = new Error('The solver broke: out of memory.');
  await going;
  expect(run().errors.some((error) => error.message.includes('out of memory'))).toBe(true);
  expect(run().main).toBe(record);
  expect(first.closed).toBe(true);
  await next.controller.run();
  await settle();
  expect(run().progress.state).toBe('done');
  expect(run().errors).toEqual([]);
  expect(spawned[0]?.closed).toBe(true);
});

test('a second run takes over from the first', async () => {
  const solver = new FakeSolver(200, 10);
  const { controller } = makeBench([solver]);
  const first = controller.run();
  await turn();
  const second = controller.run();
  await Promise.all([first, second]);
  await settle();
  expect(run().progress.state).toBe('done');
  expect(solver.calls.filter((call) => call === 'record')).toHaveLength(1);
});

test('progress reaches the store at most ten times a second', async () => {
  const { controller } = makeBench([new FakeSolver(1000, 10)]);
  let published = 0;
  const end = useRunStore.subscribe((state, before) => {
    if (state.progress !== before.progress && state.progress.state === 'running') published += 1;
  });
  // A hundred looks, 30 ms apart by the clock of the test: 3 s.
  await controller.run();
  end();
  expect(published).toBeGreaterThan(10);
  expect(published).toBeLessThanOrEqual(31);
});

test('a field that is off is not asked for, and comes back at once when it is on', async () => {
  const solver = new FakeSolver();
  useViewStore.getState().setFieldPlace('off');
  const { controller } = makeBench([solver]);
  await controller.run();
  expect(solver.views.every((view) => view === null)).toBe(true);
  expect(latestFrame()).toBeNull();
  useViewStore.getState().setFieldPlace('over');
  await settle();
  expect(latestFrame()?.view).toBe('Ez');
});

test('a field computed on another sheet is taken away', async () => {
  const { controller } = makeBench([]);
  await controller.run();
  expect(latestFrame()).not.toBeNull();
  useJobStore.getState().dispatch({ do: 'set', path: ['sheet', 'width'], value: '240 mm' });
  expect(latestFrame()).toBeNull();
  useJobStore.getState().undo();
  await settle();
  expect(latestFrame()).not.toBeNull();
});

test('turning the section turns the field shown with it', () => {
  makeBench([]);
  useViewStore.getState().setField('Hy');
  useJobStore.getState().dispatch({ do: 'set section', section: 'H out of plane' });
  expect(useViewStore.getState().field).toBe('Ey');
});

test('reopening a kept run puts its job and its records back, and can be undone', async () => {
  const { controller } = makeBench([]);
  await controller.run();
  await settle();
  useRunStore.setState({
    kept: [
      {
        id: 'run-1',
        name: 'First',
        keptAt: '2026-01-01T00:00:00.000Z',
        job: useJobStore.getState().job,
        main: run().main ?? expect.fail('no record'),
        reference: run().reference,
        overlaid: true,
      },
    ],
  });
  const kept = run().main;
  useJobStore.getState().dispatch({ do: 'set', path: ['values', 'w'], value: '5 mm' });
  await controller.run();
  await settle();
  expect(run().main).not.toBe(kept);
  controller.reopenKept('run-1');
  expect(useJobStore.getState().job.values['w']).toBe('3 mm');
  expect(run().main).toBe(kept);
  expect(run().stale).toBe(false);
  useJobStore.getState().undo();
  expect(useJobStore.getState().job.values['w']).toBe('5 mm');
  expect(run().stale).toBe(true);
});

describe('when small jobs follow edits', () => {
  const nudge = (): void => {
    useJobStore.getState().dispatch({ do: 'move', ids: ['wall-1'], dxMetres: 0.001, dyMetres: 0 });
  };
  const until = async (test: () => boolean): Promise<void> => {
    for (let k = 0; k < 500 && !test(); k += 1) await turn();
    expect(test()).toBe(true);
  };

  test('an edit after a finished run is answered by itself, and nothing of the run shows before its end', async () => {
    const solver = new FakeSolver(40);
    const { controller } = makeBench([solver, new FakeSolver(20)]);
    await controller.run();
    await settle();
    const before = run().main;
    useViewStore.getState().setFollows(true);
    const states = new Set<string>();
    const end = useRunStore.subscribe(({ progress }) => states.add(progress.state));
    nudge();
    expect(run().stale).toBe(true);
    await until(() => run().main !== before);
    end();
    expect([...states]).toEqual(['done']);
    expect(run().stale).toBe(false);
    expect(run().answeredJob).toBe(useJobStore.getState().job);
  });

  test('of many edits in a row the last is answered, with far fewer runs than edits', async () => {
    const solver = new FakeSolver(40);
    const { controller } = makeBench([solver, new FakeSolver(20)]);
    await controller.run();
    await settle();
    useViewStore.getState().setFollows(true);
    for (let k = 0; k < 60; k += 1) {
      nudge();
      if (k % 3 === 0) await turn();
    }
    await until(() => run().answeredJob === useJobStore.getState().job && !run().stale);
    const runs = solver.calls.filter((call) => call === 'open main').length;
    expect(runs).toBeGreaterThan(1);
    expect(runs).toBeLessThan(30);
  });

  test('a held run and one stopped by hand wait for the person', async () => {
    const solver = new FakeSolver(4000);
    const { controller } = makeBench([solver, new FakeSolver(20)]);
    useViewStore.getState().setFollows(true);
    const going = controller.run();
    await turn();
    await controller.hold();
    await going;
    nudge();
    await settle();
    await controller.stop();
    nudge();
    await settle();
    expect(solver.calls.filter((call) => call === 'open main')).toHaveLength(1);
  });
});
