// Owns which files a run leaves and what goes into each.
// Must not know where they are written.
import { makeInsertion } from '../engine/insertion.ts';
import { makeSpectrumCsv } from '../model/exports/spectrum-csv.ts';
import { makeTimeSeriesCsv } from '../model/exports/time-series-csv.ts';
import type { Job } from '../model/job.ts';
import { resolveJob } from '../model/resolve-job.ts';
import type { RunRecord } from '../../workers/protocol.ts';
import { makeSummary } from './summary.ts';
import { VERSION } from './version.ts';

export interface ResultFile {
  readonly name: string;
  readonly text: string;
}

export function makeResultFiles(job: Job, main: RunRecord, reference: RunRecord | null): ResultFile[] {
  const complete = [main, reference].every((run) => run?.stopReason !== 'stopped by the person');
  const insertion = reference === null ? null : makeInsertion(main, reference);
  const resolved = resolveJob(job);
  const listedHertz = resolved.ok ? resolved.value.band.listedHertz : [];
  const summary = makeSummary({ job, version: VERSION, listedHertz, main, reference, insertion, complete });
  return [
    { name: 'time-series.csv', text: makeTimeSeriesCsv(job, main, VERSION) },
    { name: 'spectrum.csv', text: makeSpectrumCsv(job, { main, reference, insertion }, VERSION) },
    { name: 'summary.json', text: `${JSON.stringify(summary, null, 2)}\n` },
  ];
}
