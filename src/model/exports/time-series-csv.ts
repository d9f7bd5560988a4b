// Owns the text of the time series file: one row per time step, three columns per probe.
// Must not know how it is saved.
import type { Job } from '../job.ts';
import { joinRows, writeDouble, writeHeadLine, writeName, writeSingle } from './csv.ts';
import type { ExportedRun } from './run-data.ts';
import { listProbeNames, makeHead, unitOf } from './run-data.ts';

/** Samples are single precision and are written so that they read back to the last bit. */
export function makeTimeSeriesCsv(job: Job, run: ExportedRun, version: string): string {
  const names = listProbeNames(job);
  const columns = run.traces.flatMap(({ probeId, samples }) =>
    run.components.map((component, k) => ({
      head: writeName(`${names.get(probeId) ?? probeId} ${component} (${unitOf(component)})`),
      samples: samples[k] ?? [],
    })),
  );
  const count = columns.reduce((most, { samples }) => Math.max(most, samples.length), 0);
  const rows = [
    ...makeHead('time series of the probes', job, run, version),
    writeHeadLine('time', 'row n is t = n times the time step'),
    ['t (s)', ...columns.map(({ head }) => head)].join(','),
  ];
  for (let n = 0; n < count; n += 1) {
    const cells = columns.map(({ samples }) => writeSingle(samples[n] ?? Number.NaN));
    rows.push([writeDouble(n * run.dtSeconds), ...cells].join(','));
  }
  return joinRows(rows);
}
