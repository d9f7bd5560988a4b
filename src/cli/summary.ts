// Owns the summary of a run for programs to read: grid, step, time, energy left, memory, throughput, H at the listed frequencies.
// Must not know how it is saved or how H is found.
import type { Remark } from '../engine/remark.ts';
import type { ExportedInsertion } from '../model/exports/spectrum-csv.ts';
import { hashJob } from '../model/job-hash.ts';
import type { Job } from '../model/job.ts';
import type { FieldComponent, RunRecord, StopReason } from '../../workers/protocol.ts';

export interface RunSummary {
  readonly planHash: string;
  readonly stopReason: StopReason;
  readonly steps: number;
  readonly timeSeconds: number;
  /** Energy left on the sheet below its peak. */
  readonly energyDb: number;
  readonly wallSeconds: number;
  readonly threads: number;
  readonly megaCellsPerSecond: number;
}

/** H of one component at one frequency; null where it is no number (nothing in the reference to divide by). */
export interface RatioSummary {
  readonly re: number | null;
  readonly im: number | null;
  readonly db: number | null;
  readonly belowFloor: boolean;
}

export interface ProbeSummary {
  readonly id: string;
  readonly name: string;
  readonly at: readonly [string, string];
  readonly listed: readonly {
    readonly frequencyHertz: number;
    readonly h: Readonly<Partial<Record<FieldComponent, RatioSummary>>> | null;
  }[];
}

export interface Summary {
  readonly program: string;
  readonly job: { readonly title: string; readonly sha256: string; readonly section: Job['section'] };
  readonly convention: string;
  /** False when the person stopped the main or the reference run. */
  readonly complete: boolean;
  readonly grid: {
    readonly cellsX: number;
    readonly cellsY: number;
    readonly cellsTotal: number;
    readonly dxMetres: number;
    readonly dyMetres: number;
    readonly cellsPerShortestWavelength: number;
  };
  readonly timeStepSeconds: number;
  readonly memoryBytes: number;
  readonly main: RunSummary;
  readonly reference: RunSummary | null;
  readonly remarks: readonly Remark[];
  readonly probes: readonly ProbeSummary[];
}

export interface SummaryInput {
  readonly job: Job;
  readonly version: string;
  readonly listedHertz: readonly number[];
  readonly main: RunRecord;
  readonly reference: RunRecord | null;
  readonly insertion: readonly ExportedInsertion[] | null;
  readonly complete: boolean;
}

export function makeSummary(input: SummaryInput): Summary {
  const { job, main, reference } = input;
  const { cellsX, cellsY, cellsTotal, dxMetres, dyMetres, cellsPerShortestWavelength, memoryBytes, remarks } = main.estimate;
  return {
    program: `Guidewall ${input.version}`,
    job: { title: job.title, sha256: hashJob(job), section: job.section },
    convention: 'exp(+jwt), peak values, SI units; H is the run over the reference',
    complete: input.complete,
    grid: { cellsX, cellsY, cellsTotal, dxMetres, dyMetres, cellsPerShortestWavelength },
    timeStepSeconds: main.dtSeconds,
    memoryBytes,
    main: summariseRun(main),
    reference: reference === null ? null : summariseRun(reference),
    remarks,
    probes: job.probes.map((probe) => summariseProbe(probe, input)),
  };
}

function summariseRun(run: RunRecord): RunSummary {
  const { planHash, stopReason, steps, energyDb, wallSeconds, threads, megaCellsPerSecond } = run;
  const timeSeconds = steps * run.dtSeconds;
  return { planHash, stopReason, steps, timeSeconds, energyDb, wallSeconds, threads, megaCellsPerSecond };
}

function summariseProbe(probe: Job['probes'][number], { listedHertz, main, insertion }: SummaryInput): ProbeSummary {
  const ratios = insertion?.find(({ probeId }) => probeId === probe.id);
  const { id, name, at } = probe;
  const listed = listedHertz.map((frequencyHertz) => ({
    frequencyHertz,
    h: ratios === undefined ? null : ratiosAt(main, ratios, main.frequenciesHertz.indexOf(frequencyHertz)),
  }));
  return { id, name, at, listed };
}

function ratiosAt(main: RunRecord, ratios: ExportedInsertion, row: number): Partial<Record<FieldComponent, RatioSummary>> {
  return Object.fromEntries(
    main.components.map((component, k) => {
      const ratio = ratios.components[k];
      const re = ratio?.re[row] ?? Number.NaN;
      const im = ratio?.im[row] ?? Number.NaN;
      const db = 20 * Math.log10(Math.hypot(re, im));
      return [component, { re: orNull(re), im: orNull(im), db: orNull(db), belowFloor: Boolean(ratio?.belowFloor[row] ?? true) }];
    }),
  );
}

function orNull(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}
