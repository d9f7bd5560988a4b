// Owns the first moments: what was saved or the first example comes on the sheet and runs; saving begins.
// Must not know React components.
import type { AppError } from '../base/result.ts';
import type { Job } from '../model/job.ts';
import { exampleShelf } from './examples.ts';
import { useJobStore } from './job-store.ts';
import { tell, tellTrouble } from './notice-store.ts';
import { restore, Saver, type Restored } from './persistence.ts';
import { runActions, runController } from './run-actions.ts';
import { useRunStore, type KeptRun } from './run-store.ts';
import { becomeSavingTab } from './saving-tab.ts';
import { openLastWords, openShelf, type LastWords, type Shelf } from './shelf.ts';
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
  void saveFromNowOn(shelf, lastWords, restored);
  runController.attach();
  void runActions.run();
  void exampleShelf.preload();
}

/** Two tabs would write over each other: the second saves nothing while the first is open, and then offers what that held. */
async function saveFromNowOn(shelf: Shelf, lastWords: LastWords, restored: Restored): Promise<void> {
  const opened = useJobStore.getState().job;
  const tellOther = (): void => {
    useJobStore.setState({ saved: 'not saved' });
    tellTrouble('The bench is open in another tab, and that one saves by itself.', [
      { code: 'other tab', message: 'What you do here is not saved.', hint: 'Save the job as a file, or close the other tab.' },
    ]);
  };
  const { waited } = await becomeSavingTab(tellOther, (attempt) =>
    useJobStore.subscribe((state, before) => state.job !== before.job && attempt()),
  );
  const saver = new Saver(shelf, lastWords);
  if (waited) {
    const now = await restore(shelf, lastWords);
    const { job } = now;
    useRunStore.setState({ kept: joinKept(now.kept, useRunStore.getState().kept) });
    tell(
      'The other tab is closed: this one saves now.',
      job === null ? null : { label: 'Open what it held', run: () => useJobStore.getState().dispatch({ do: 'replace', job }) },
    );
    saver.attach({ ...now, job: null });
  } else {
    saver.attach(restored, opened);
  }
  addEventListener('pagehide', () => saver.leave());
  document.addEventListener('visibilitychange', () => saver.leave());
}

/** Those of both, each once, oldest first. */
function joinKept(saved: readonly KeptRun[], own: readonly KeptRun[]): readonly KeptRun[] {
  const known = new Set(saved.map((run) => run.id));
  return [...saved, ...own.filter((run) => !known.has(run.id))].sort((a, b) => (a.keptAt < b.keptAt ? -1 : 1));
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
