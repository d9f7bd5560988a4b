// Owns saving job and run book by themselves and bringing them back, whatever state the stored data is in.
// Must not know React components or workers.
import type { AppError } from '../base/result.ts';
import type { Job } from '../model/job.ts';
import { parseJob } from '../model/parse-job.ts';
import { serialiseJob } from '../model/serialise-job.ts';
import { useJobStore } from './job-store.ts';
import { tellTrouble } from './notice-store.ts';
import type { KeptRun } from './run-store.ts';
import { useRunStore } from './run-store.ts';
import type { LastWords, Shelf } from './shelf.ts';
import { readStoredRun } from './stored-run.ts';

/** Longest time between an edit and its being on the shelf, while the page lives. */
const SAVE_MILLISECONDS = 400;
const JOB_KEY = 'job';
const RUN_KEY = 'run ';
/** Unreadable data is put here and never deleted by the program. */
const ASIDE_KEY = 'aside ';

export interface Restored {
  readonly job: Job | null;
  readonly kept: readonly KeptRun[];
  /** What could not be read; it lies aside. */
  readonly troubles: readonly AppError[];
}

async function putAside(shelf: Shelf, key: string, value: unknown): Promise<void> {
  await shelf.set(`${ASIDE_KEY}${new Date().toISOString()} ${key}`, value);
  await shelf.del(key);
}

/** Reads what was saved. Never fails: what cannot be read is put aside and told. */
export async function restore(shelf: Shelf, lastWords: LastWords): Promise<Restored> {
  const troubles: AppError[] = [];
  const kept: KeptRun[] = [];
  // A note that is there is newer than the shelf: a finished write takes it away.
  const note = parseJob(lastWords.read() ?? '');
  let job: Job | null = note.ok ? note.value : null;
  try {
    const stored = await shelf.get(JOB_KEY);
    if (stored !== undefined && job === null) {
      const parsed = parseJob(stored);
      if (parsed.ok) job = parsed.value;
      else {
        troubles.push(...parsed.errors);
        await putAside(shelf, JOB_KEY, stored);
      }
    }
    for (const key of await shelf.keys()) {
      if (!key.startsWith(RUN_KEY)) continue;
      const value = await shelf.get(key);
      const run = readStoredRun(value);
      if (run.ok) kept.push(run.value);
      else {
        troubles.push(...run.errors);
        await putAside(shelf, key, value);
      }
    }
  } catch (error) {
    troubles.push(describeShelf(error));
  }
  kept.sort((a, b) => (a.keptAt < b.keptAt ? -1 : 1));
  return { job, kept, troubles };
}

function describeShelf(error: unknown): AppError {
  return {
    code: 'storage',
    message: `The browser keeps nothing for this page (${error instanceof Error ? error.message : String(error)}).`,
    hint: 'Save the job as a file; leave private browsing or free some disc space.',
  };
}

/** Writes what changed, at most once in `SAVE_MILLISECONDS`; `flush` writes at once. */
export class Saver {
  private readonly shelf: Shelf;
  private readonly lastWords: LastWords;
  private savedJob: Job | null = null;
  private savedRuns: ReadonlyMap<string, KeptRun> = new Map();
  private timer: ReturnType<typeof setTimeout> | null = null;
  private writing: Promise<void> = Promise.resolve();
  private told = false;

  constructor(shelf: Shelf, lastWords: LastWords) {
    this.shelf = shelf;
    this.lastWords = lastWords;
  }

  /** Saves from now on; `opened`, the job put in the store from what was restored, counts as saved when `saved` says so. */
  attach(saved: Restored, opened = useJobStore.getState().job): () => void {
    // A note becomes a saved job by being written once more.
    const onShelf = saved.job !== null && this.lastWords.read() === null;
    this.savedJob = onShelf ? opened : null;
    this.savedRuns = new Map(saved.kept.map((run) => [run.id, run]));
    const endJob = useJobStore.subscribe((state, before) => {
      if (state.job !== before.job) this.saveSoon();
    });
    const endRuns = useRunStore.subscribe((state, before) => {
      if (state.kept !== before.kept) this.saveSoon();
    });
    if (useJobStore.getState().job !== this.savedJob) this.saveSoon();
    return () => {
      endJob();
      endRuns();
      void this.flush();
    };
  }

  flush(): Promise<void> {
    if (this.timer === null) return this.writing;
    clearTimeout(this.timer);
    this.timer = null;
    // One after the other, so that an older job never lands on a newer one.
    this.writing = this.writing.then(() => this.write());
    return this.writing;
  }

  /** The page may be gone before a write is done: the job is left as a note, and written as well. */
  leave(): void {
    const { job } = useJobStore.getState();
    if (job !== this.savedJob) this.lastWords.write(serialiseJob(job));
    void this.flush();
  }

  private saveSoon(): void {
    if (useJobStore.getState().saved !== 'saving') useJobStore.setState({ saved: 'saving' });
    this.timer ??= setTimeout(() => void this.flush(), SAVE_MILLISECONDS);
  }

  private async write(): Promise<void> {
    const { job } = useJobStore.getState();
    const runs = new Map(useRunStore.getState().kept.map((run) => [run.id, run]));
    try {
      if (job !== this.savedJob) await this.shelf.set(JOB_KEY, serialiseJob(job));
      this.savedJob = job;
      for (const [id, run] of runs) if (this.savedRuns.get(id) !== run) await this.shelf.set(RUN_KEY + id, run);
      for (const id of this.savedRuns.keys()) if (!runs.has(id)) await this.shelf.del(RUN_KEY + id);
      this.savedRuns = runs;
      if (useJobStore.getState().job === job) this.lastWords.write(null);
      if (this.timer === null) useJobStore.setState({ saved: 'saved' });
    } catch (error) {
      useJobStore.setState({ saved: 'not saved' });
      if (!this.told) tellTrouble('What you do is not being saved.', [describeShelf(error)]);
      this.told = true;
    }
  }
}
