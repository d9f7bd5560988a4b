// Owns the way from a job written as a plain object to the numbers of its finished run.
// Must not know what the numbers are compared with.
import { describeError, type Result } from '../../src/base/result.ts';
import { parseJob } from '../../src/model/parse-job.ts';
import type { FieldComponent, RunRecord, RunRole } from '../../workers/protocol.ts';
import { runToEnd } from '../../workers/run-to-end.ts';
import { makeNodeSession } from '../../workers/session.node.ts';
import { divide, type Complex } from '../oracles/complex.ts';

/** Both sections, with the component that points out of the plane. */
export const SECTIONS = [
  { section: 'E out of plane', axial: 'Ez', source: 'A' },
  { section: 'H out of plane', axial: 'Hz', source: 'V' },
] as const;

export type SectionCase = (typeof SECTIONS)[number];

export function unwrap<T>(result: Result<T>): T {
  if (!result.ok) throw new Error(result.errors.map(describeError).join('\n'));
  return result.value;
}

/** Runs a job document (a plain object) to its stop; throws with the errors, or when the run went wrong. */
export async function runJob(draft: unknown, role: RunRole = 'main'): Promise<RunRecord> {
  const job = unwrap(parseJob(draft));
  const session = makeNodeSession();
  const record = unwrap(await runToEnd(session, job, role));
  if (record.trouble !== null) throw new Error(record.trouble);
  return record;
}

export function traceOf(record: RunRecord, probeId: string, component: FieldComponent): Float32Array {
  const trace = record.traces.find((one) => one.probeId === probeId)?.samples[record.components.indexOf(component)];
  if (trace === undefined) throw new Error(`The record holds no ${component} of ${probeId}.`);
  return trace;
}

export function spectrumOf(record: RunRecord, probeId: string, component: FieldComponent): readonly Complex[] {
  const spectrum = record.spectra.find((one) => one.probeId === probeId)?.components[record.components.indexOf(component)];
  if (spectrum === undefined) throw new Error(`The record holds no ${component} of ${probeId}.`);
  return Array.from(spectrum.re, (re, k): Complex => [re, spectrum.im[k] ?? NaN]);
}

/** One spectrum over another, frequency by frequency. */
export function ratioOf(above: readonly Complex[], below: readonly Complex[]): readonly Complex[] {
  return above.map((value, k) => divide(value, below[k] ?? [NaN, NaN]));
}

/** Field at a probe over the same in the reference run, at the frequencies of the record. */
export async function insertionOf(
  draft: unknown,
  probeIds: readonly string[],
  component: FieldComponent,
): Promise<{ readonly frequenciesHertz: readonly number[]; readonly ratios: readonly (readonly Complex[])[] }> {
  const main = await runJob(draft, 'main');
  const reference = await runJob(draft, 'reference');
  return {
    frequenciesHertz: Array.from(main.frequenciesHertz),
    ratios: probeIds.map((id) => ratioOf(spectrumOf(main, id, component), spectrumOf(reference, id, component))),
  };
}

export function millimetres(value: number): string {
  return `${value} mm`;
}

/** A corner, a centre, a probe: two lengths in millimetres. */
export function at(x: number, y: number): [string, string] {
  return [millimetres(x), millimetres(y)];
}

export function edges(horizontal: string, vertical: string): Record<'left' | 'right' | 'bottom' | 'top', string> {
  return { left: horizontal, right: horizontal, bottom: vertical, top: vertical };
}

/** A material of the job's own. */
export function ownMaterial(id: string, permittivity: number, permeability = 1, conductivity = 0, magneticLoss = 0) {
  return { id, permittivity, permeability, conductivity, magneticLoss };
}
