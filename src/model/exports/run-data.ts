// Owns what an export needs to know of a finished run, and the head all exports share.
// Must not know workers: a run record fits this shape.
import { formatQuantity } from '../../base/quantity.ts';
import type { Job } from '../job.ts';
import { hashJob } from '../job-hash.ts';
import { writeDouble, writeHeadLine } from './csv.ts';

export interface ComplexArray {
  readonly re: ArrayLike<number>;
  readonly im: ArrayLike<number>;
}

/** A run as the exports see it; `components` name the three fields each probe has, in order. */
export interface ExportedRun {
  readonly components: readonly string[];
  readonly dtSeconds: number;
  readonly steps: number;
  readonly stopReason: string;
  readonly energyDb: number;
  readonly estimate: { readonly cellsX: number; readonly cellsY: number; readonly dxMetres: number; readonly dyMetres: number };
  readonly frequenciesHertz: ArrayLike<number>;
  readonly traces: readonly { readonly probeId: string; readonly samples: readonly ArrayLike<number>[] }[];
  readonly spectra: readonly { readonly probeId: string; readonly components: readonly ComplexArray[] }[];
}

/** Unit of a field component by its name. */
export function unitOf(component: string): string {
  return component.startsWith('E') ? 'V/m' : 'A/m';
}

/** Probe names by id, told apart by their ids where two are alike. */
export function listProbeNames(job: Job): ReadonlyMap<string, string> {
  const counts = new Map<string, number>();
  for (const { name } of job.probes) counts.set(name, (counts.get(name) ?? 0) + 1);
  return new Map(job.probes.map(({ id, name }) => [id, (counts.get(name) ?? 0) > 1 ? `${name} (${id})` : name]));
}

export function describeRun(run: ExportedRun): string {
  const decay = Number.isFinite(run.energyDb)
    ? ` with the energy at ${writeDouble(Number(run.energyDb.toFixed(2)))} dB of its peak`
    : '';
  return `ended after ${run.steps} steps: ${run.stopReason}${decay}`;
}

/** Lines every export starts with. No clock: the same job gives the same file in the browser and on the command line. */
export function makeHead(what: string, job: Job, run: ExportedRun, version: string): string[] {
  const { cellsX, cellsY, dxMetres, dyMetres } = run.estimate;
  const cell = `${formatQuantity(dxMetres, 'length')} by ${formatQuantity(dyMetres, 'length')}`;
  return [
    writeHeadLine('content', what),
    writeHeadLine('program', `Guidewall ${version}`),
    writeHeadLine('job', job.title),
    writeHeadLine('job hash', `sha256 ${hashJob(job)}`),
    writeHeadLine('section', job.section),
    writeHeadLine('convention', 'exp(+jwt) and peak values'),
    writeHeadLine('units', 'SI'),
    writeHeadLine('grid', `${cellsX} by ${cellsY} cells of ${cell}`),
    writeHeadLine('time step', `${writeDouble(run.dtSeconds)} s`),
    writeHeadLine('run', describeRun(run)),
  ];
}
