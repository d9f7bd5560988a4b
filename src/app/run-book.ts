// Owns the list of kept runs: keeping, naming, laying over, taking out and putting back.
// Must not know React components, workers, or where kept runs are stored.
import type { RunRecord } from '../../workers/protocol.ts';
import { describeChange } from './describe-change.ts';
import { useJobStore } from './job-store.ts';
import { tell } from './notice-store.ts';
import type { KeptRun } from './run-store.ts';
import { NO_PROGRESS, useRunStore } from './run-store.ts';

function freeId(kept: readonly KeptRun[]): string {
  const taken = new Set(kept.map((run) => run.id));
  let number = 1;
  while (taken.has(`run-${number}`)) number += 1;
  return `run-${number}`;
}

/** What the run is called until the person says otherwise: what changed since the one kept before. */
function suggestName(kept: readonly KeptRun[], run: Pick<KeptRun, 'job'>): string {
  const before = kept.at(-1);
  const title = run.job.title.trim() === '' ? 'Run' : run.job.title;
  if (before === undefined) return title;
  return describeChange(before.job, run.job) ?? `${title}, again`;
}

/** Names longer than this are cut: a run must fit on its line. */
const LONGEST_NAME = 80;

function cutName(name: string): string {
  return name.length > LONGEST_NAME ? `${name.slice(0, LONGEST_NAME - 1)}\u2026` : name;
}

/** Keeps the run shown, when there is one that has ended. */
export function keepRun(name?: string): void {
  const { main, reference, answeredJob, kept } = useRunStore.getState();
  if (main === null || answeredJob === null) return;
  const wanted = name?.trim() ?? '';
  const run: KeptRun = {
    id: freeId(kept),
    name: cutName(wanted === '' ? suggestName(kept, { job: answeredJob }) : wanted),
    keptAt: new Date().toISOString(),
    job: answeredJob,
    main,
    reference,
    overlaid: true,
  };
  useRunStore.setState({ kept: [...kept, run] });
}

function change(id: string, edit: (run: KeptRun) => KeptRun): void {
  useRunStore.setState((state) => ({ kept: state.kept.map((run) => (run.id === id ? edit(run) : run)) }));
}

/** An empty name leaves the old one. */
export function renameKept(id: string, name: string): void {
  const wanted = name.trim();
  if (wanted !== '') change(id, (run) => ({ ...run, name: cutName(wanted) }));
}

export function overlayKept(id: string, on: boolean): void {
  change(id, (run) => ({ ...run, overlaid: on }));
}

/** Takes a run out and offers the way back for as long as the notice stands. */
export function removeKept(id: string): void {
  const { kept } = useRunStore.getState();
  const at = kept.findIndex((run) => run.id === id);
  const run = kept[at];
  if (run === undefined) return;
  useRunStore.setState({ kept: kept.toSpliced(at, 1) });
  tell(`${run.name} is out of the run book.`, { label: 'Put it back', run: () => putBack(run, at) });
}

function putBack(run: KeptRun, at: number): void {
  const { kept } = useRunStore.getState();
  const taken = kept.some((other) => other.id === run.id);
  const back = taken ? { ...run, id: freeId(kept) } : run;
  useRunStore.setState({ kept: kept.toSpliced(Math.min(at, kept.length), 0, back) });
}

/** What the run differs in from the one kept before it; null for the first. */
export function describeKept(kept: readonly KeptRun[], id: string): string | null {
  const at = kept.findIndex((run) => run.id === id);
  const [before, run] = [kept[at - 1], kept[at]];
  return before === undefined || run === undefined ? null : (describeChange(before.job, run.job) ?? 'the same job');
}

/** Puts the readings of a kept run on show. */
export function showKept(run: KeptRun): void {
  useRunStore.setState({
    progress: NO_PROGRESS,
    main: run.main,
    reference: run.reference,
    referenceState: run.reference === null ? 'none' : 'done',
    answeredJob: useJobStore.getState().job,
    components: run.main.components,
    liveTraces: [],
    liveCount: 0,
    stale: false,
  });
}

/** Puts a reference beside the run on show; that run, kept before its reference had ended, gets it too. */
export function showReference(reference: RunRecord | null): void {
  useRunStore.setState(({ main, kept }) => ({
    reference,
    kept: kept.map((run) => (run.main === main && run.reference === null ? { ...run, reference } : run)),
  }));
}
