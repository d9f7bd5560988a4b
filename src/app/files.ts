// Owns what goes to and comes from the person's discs: job files, CSV, pictures.
// Must not know React components, or what stands in the files.
import { fileOpen, fileSave } from 'browser-fs-access';
import { version } from '../../package.json';
import type { AppError, Result } from '../base/result.ts';
import { makeTimeSeriesCsv } from '../model/exports/time-series-csv.ts';
import { makeInsertion } from '../engine/insertion.ts';
import { makeSpectrumCsv } from '../model/exports/spectrum-csv.ts';
import type { Job } from '../model/job.ts';
import { makeEmptyJob } from '../model/new-job.ts';
import { parseJob } from '../model/parse-job.ts';
import { serialiseJob } from '../model/serialise-job.ts';
import type { Example } from './examples.ts';
import { exampleShelf } from './examples.ts';
import { publishFrame } from './frame-channel.ts';
import { useJobStore } from './job-store.ts';
import { tell, tellTrouble } from './notice-store.ts';
import type { Samples } from './read-samples.ts';
import { readSamples } from './read-samples.ts';
import { runActions } from './run-actions.ts';
import { useRunStore } from './run-store.ts';
import { exportSheet } from './sheet-exporter.ts';

const JOB_FILE = { description: 'Guidewall job', mimeTypes: ['application/json'], extensions: ['.json'] };

/** Where the job was opened from or saved to, so that saving again asks nothing. */
let home: { readonly title: string; readonly handle: FileSystemFileHandle } | null = null;

/** True when the person closed the dialog of the browser without choosing. */
function wasDismissed(error: unknown): boolean {
  return error instanceof DOMException && error.name === 'AbortError';
}

function reasonOf(error: unknown): AppError {
  return { code: 'file', message: error instanceof Error ? error.message : String(error) };
}

/** A file name every system takes, from the title. */
export function makeFileName(title: string, ending: string): string {
  const stem = title
    .normalize('NFKD')
    .replaceAll(/[^\p{L}\p{N}]+/gu, '-')
    .replaceAll(/^-+|-+$/g, '')
    .toLowerCase()
    .slice(0, 60);
  return `${stem === '' ? 'guidewall' : stem}${ending}`;
}

/** Puts another job on the sheet, undoably; a broken one leaves everything as it is and says why. */
export function takeJob(read: Result<Job>, name: string): boolean {
  const taken = read.ok ? useJobStore.getState().dispatch({ do: 'replace', job: read.value }) : read;
  if (!taken.ok) {
    useJobStore.getState().dismissRefusal();
    tellTrouble(`${name} was not opened; your job is as it was.`, taken.errors);
    return false;
  }
  home = null;
  // The field of another job says nothing of this one.
  publishFrame(null);
  return true;
}

export async function openJobFile(): Promise<void> {
  try {
    const file = await fileOpen(JOB_FILE);
    if ((await openDropped(file)) && file.handle !== undefined) rememberHome(file.handle);
  } catch (error) {
    if (!wasDismissed(error)) tellTrouble('The file could not be read.', [reasonOf(error)]);
  }
}

export async function openDropped(file: File): Promise<boolean> {
  try {
    return takeJob(parseJob(await file.text()), file.name);
  } catch (error) {
    tellTrouble(`${file.name} could not be read.`, [reasonOf(error)]);
    return false;
  }
}

/** Examples are there to be watched: they run at once. */
export async function openExample(example: Example): Promise<void> {
  if (takeJob(await exampleShelf.job(example), example.title)) await runActions.run();
}

export function startNewJob(): void {
  takeJob({ ok: true, value: makeEmptyJob() }, 'The new job');
}

function rememberHome(handle: FileSystemFileHandle): void {
  home = { title: useJobStore.getState().job.title, handle };
}

export async function saveJobFile(): Promise<void> {
  const { job } = useJobStore.getState();
  const blob = new Blob([serialiseJob(job)], { type: 'application/json' });
  const known = home !== null && home.title === job.title ? home.handle : null;
  try {
    const handle = await fileSave(blob, { ...JOB_FILE, fileName: makeFileName(job.title, '.json') }, known);
    if (handle !== null) rememberHome(handle);
    tell('The job is saved as a file.');
  } catch (error) {
    if (!wasDismissed(error)) tellTrouble('The job file could not be written.', [reasonOf(error)]);
  }
}

/** Asks for a CSV file of drive samples; null when the person chose none or it could not be read, which is then told. */
export async function openSamples(): Promise<{ readonly name: string; readonly samples: Samples } | null> {
  try {
    const file = await fileOpen({
      description: 'Samples',
      mimeTypes: ['text/csv', 'text/plain'],
      extensions: ['.csv', '.txt', '.tsv'],
    });
    const samples = readSamples(await file.text());
    if (samples.ok) return { name: file.name, samples: samples.value };
    tellTrouble(`${file.name} holds no samples that can be played.`, samples.errors);
  } catch (error) {
    if (!wasDismissed(error)) tellTrouble('The file could not be read.', [reasonOf(error)]);
  }
  return null;
}

function download(blob: Blob, name: string): void {
  const link = document.createElement('a');
  link.href = URL.createObjectURL(blob);
  link.download = name;
  link.click();
  // The browser reads the address after the click has returned.
  setTimeout(() => URL.revokeObjectURL(link.href), 10_000);
}

const NOTHING_YET: readonly AppError[] = [
  { code: 'no run', message: 'No run has ended yet.', hint: 'Run the job, or stop the run under way.' },
];

export function exportTimeSeries(): void {
  const { main, answeredJob } = useRunStore.getState();
  if (main === null || answeredJob === null) return tellTrouble('There are no time series to export.', NOTHING_YET);
  const text = makeTimeSeriesCsv(answeredJob, main, version);
  download(new Blob([text], { type: 'text/csv' }), makeFileName(answeredJob.title, '-time-series.csv'));
}

/** A spectrum without its reference would lack H: the reference run under way is waited for. */
function referenceSettled(): Promise<void> {
  return new Promise((resolve) => {
    const end = useRunStore.subscribe(look);
    function look(): void {
      if (useRunStore.getState().referenceState === 'running') return;
      end();
      resolve();
    }
    look();
  });
}

export async function exportSpectrum(): Promise<void> {
  await referenceSettled();
  const { main, reference, answeredJob } = useRunStore.getState();
  if (main === null || answeredJob === null) return tellTrouble('There is no spectrum to export.', NOTHING_YET);
  const insertion = reference === null ? null : makeInsertion(main, reference);
  const text = makeSpectrumCsv(answeredJob, { main, reference, insertion }, version);
  download(new Blob([text], { type: 'text/csv' }), makeFileName(answeredJob.title, '-spectrum.csv'));
}

export async function exportSheetPicture(): Promise<void> {
  const picture = await exportSheet();
  if (picture === null) tellTrouble('The sheet is not on the screen.');
  else download(picture, makeFileName(useJobStore.getState().job.title, '-sheet.png'));
}
