// Owns the first moments: what was saved or the first example comes on the sheet and runs; saving begins.
// Must not know React components.
import type { AppError } from '../base/result.ts';
import type { Job } from '../model/job.ts';
import { exampleShelf } from './examples.ts';
import { useJobStore } from './job-store.ts';
import { tellTrouble } from './notice-store.ts';
import { restore, Saver } from './persistence.ts';
import { runActions, runController } from './run-actions.ts';
import { useRunStore } from './run-store.ts';
import { openLastWords, openShelf } from './shelf.ts';
import { useViewStore } from './view-store.ts';

/** Called once, before the first paint; never waits for the person. */
export async function startApp(): Promise<void> {
  followSelection();
  const shelf = openShelf();
  const lastWords = openLastWords();
  const restored = await restore(shelf, lastWords);
  useRunStore.setState({ kept: restored.kept });
  const job = restored.job ?? (await firstExample());
  if (job !== null) useJobStore.getState().dispatch({ do: 'replace', job }, { kind: 'skip' });
  if (restored.troubles.length > 0) {
    tellTrouble('Some of what was saved could not be read. It is kept aside in the browser.', restored.troubles);
  }
  const saver = new Saver(shelf, lastWords);
  saver.attach(restored);
  addEventListener('pagehide', () => saver.leave());
  document.addEventListener('visibilitychange', () => saver.leave());
  runController.attach();
  void runActions.run();
  void exampleShelf.preload();
}

async function firstExample(): Promise<Job | null> {
  const complain = (errors: readonly AppError[]): null => {
    tellTrouble('The first example could not be opened.', errors);
    return null;
  };
  const list = await exampleShelf.examples();
  if (!list.ok) return complain(list.errors);
  const [first] = list.value;
  if (first === undefined) return null;
  const job = await exampleShelf.job(first);
  return job.ok ? job.value : complain(job.errors);
}

/** Things that are gone (removed, undone) are no longer selected. */
function followSelection(): void {
  useJobStore.subscribe(({ job }, before) => {
    if (job === before.job) return;
    const { selection, select } = useViewStore.getState();
    if (selection.length === 0) return;
    const there = new Set([...job.parts, ...job.drives, ...job.probes].map((thing) => thing.id));
    select(selection.filter((id) => there.has(id)));
  });
}
