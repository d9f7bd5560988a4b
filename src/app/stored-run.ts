// Owns judging what was stored as a kept run: only whole ones come back.
// Must not know where it was stored.
import type { Result } from '../base/result.ts';
import { fail, ok } from '../base/result.ts';
import type { RunRecord } from '../../workers/protocol.ts';
import { parseJob } from '../model/parse-job.ts';
import type { KeptRun } from './run-store.ts';

function isObject(value: unknown): value is Readonly<Record<string, unknown>> {
  return typeof value === 'object' && value !== null;
}

function isSpectrum(value: unknown, length: number): boolean {
  const fits = (part: unknown): boolean => part instanceof Float64Array && part.length === length;
  return isObject(value) && fits(value['re']) && fits(value['im']);
}

function isTrace(value: unknown): boolean {
  if (!isObject(value) || typeof value['probeId'] !== 'string') return false;
  const { samples } = value;
  return Array.isArray(samples) && samples.length === 3 && samples.every((part) => part instanceof Float32Array);
}

function isProbeSpectrum(value: unknown, length: number): boolean {
  if (!isObject(value) || typeof value['probeId'] !== 'string') return false;
  const { components } = value;
  return Array.isArray(components) && components.length === 3 && components.every((part) => isSpectrum(part, length));
}

function isRecord(value: unknown): value is RunRecord {
  if (!isObject(value)) return false;
  const { frequenciesHertz, traces, spectra, components, estimate } = value;
  if (!(frequenciesHertz instanceof Float64Array)) return false;
  const numbers = ['dtSeconds', 'steps', 'energyDb', 'wallSeconds', 'megaCellsPerSecond'];
  return (
    numbers.every((key) => typeof value[key] === 'number') &&
    typeof value['planHash'] === 'string' &&
    typeof value['stopReason'] === 'string' &&
    Array.isArray(components) &&
    components.length === 3 &&
    isObject(estimate) &&
    Array.isArray(traces) &&
    traces.every(isTrace) &&
    Array.isArray(spectra) &&
    spectra.every((spectrum) => isProbeSpectrum(spectrum, frequenciesHertz.length)) &&
    isSpectrum(value['driveSpectrum'], frequenciesHertz.length)
  );
}

/** The run as it was kept, or why it cannot be used. */
export function readStoredRun(stored: unknown): Result<KeptRun> {
  const broken = (message: string): Result<KeptRun> =>
    fail({ code: 'stored run', message, hint: 'Open its job again and run it.' });
  if (!isObject(stored)) return broken('A kept run is not readable.');
  const { id, name, keptAt, overlaid, main, reference } = stored;
  if (typeof id !== 'string' || typeof name !== 'string' || typeof keptAt !== 'string') {
    return broken('A kept run has lost its name.');
  }
  const job = parseJob(stored['job']);
  if (!job.ok) return broken(`The job of the kept run "${name}" is not readable: ${job.errors[0].message}`);
  if (!isRecord(main) || !(reference === null || isRecord(reference))) {
    return broken(`The record of the kept run "${name}" is not whole.`);
  }
  return ok({ id, name, keptAt, job: job.value, main, reference, overlaid: overlaid === true });
}
