// Owns the text of the spectrum file: one row per frequency; per probe and component the run, the reference and H.
// Must not know how it is saved or how H and its floor are found.
import type { Job } from '../job.ts';
import { joinRows, writeDouble, writeHeadLine, writeName } from './csv.ts';
import type { ComplexArray, ExportedRun } from './run-data.ts';
import { describeRun, listProbeNames, makeHead, unitOf } from './run-data.ts';

/** H of one probe, component by component in the order of the run's. */
export interface ExportedInsertion {
  readonly probeId: string;
  readonly components: readonly (ComplexArray & {
    /** True (or 1) where the value lies under what truncation or single precision hides. */
    readonly belowFloor: ArrayLike<boolean | number>;
  })[];
}

export interface SpectrumData {
  readonly main: ExportedRun;
  readonly reference: ExportedRun | null;
  readonly insertion: readonly ExportedInsertion[] | null;
}

interface Column {
  readonly head: string;
  readonly cell: (row: number) => string;
}

function at(values: ArrayLike<number>, row: number): number {
  return values[row] ?? Number.NaN;
}

function complexColumns(label: string, unit: string, { re, im }: ComplexArray): readonly Column[] {
  const suffix = unit === '' ? '' : ` (${unit})`;
  return [
    { head: `${label} re${suffix}`, cell: (row) => writeDouble(at(re, row)) },
    { head: `${label} im${suffix}`, cell: (row) => writeDouble(at(im, row)) },
  ];
}

function insertionColumns(label: string, ratio: ExportedInsertion['components'][number]): readonly Column[] {
  return [
    ...complexColumns(`${label} H`, '', ratio),
    { head: `${label} H (dB)`, cell: (row) => writeDouble(20 * Math.log10(Math.hypot(at(ratio.re, row), at(ratio.im, row)))) },
    { head: `${label} H below floor`, cell: (row) => (ratio.belowFloor[row] ? '1' : '0') },
  ];
}

function listColumns(job: Job, { main, reference, insertion }: SpectrumData): readonly Column[] {
  const names = listProbeNames(job);
  return main.spectra.flatMap(({ probeId, components }) => {
    const referenceSpectrum = reference?.spectra.find((spectrum) => spectrum.probeId === probeId);
    const ratios = insertion?.find((one) => one.probeId === probeId);
    return main.components.flatMap((component, k) => {
      const label = `${names.get(probeId) ?? probeId} ${component}`;
      const unit = `${unitOf(component)}/Hz`;
      const [own, other, ratio] = [components[k], referenceSpectrum?.components[k], ratios?.components[k]];
      return [
        ...(own === undefined ? [] : complexColumns(label, unit, own)),
        ...(other === undefined ? [] : complexColumns(`${label} reference`, unit, other)),
        ...(ratio === undefined ? [] : insertionColumns(label, ratio)),
      ];
    });
  });
}

/** Spectra are integrals of f(t) exp(-jwt) dt; H is the run over the reference. */
export function makeSpectrumCsv(job: Job, data: SpectrumData, version: string): string {
  const columns = listColumns(job, data);
  const rows = [
    ...makeHead('spectra of the probes', job, data.main, version),
    writeHeadLine('reference run', data.reference === null ? 'none' : `${job.reference}: ${describeRun(data.reference)}`),
    writeHeadLine('spectrum', 'integral of f(t) exp(-jwt) dt over the record'),
    writeHeadLine('H', 'run over reference. The column named below floor is 1 where truncation or single precision hides H'),
    ['f (Hz)', ...columns.map(({ head }) => writeName(head))].join(','),
  ];
  const frequencies = data.main.frequenciesHertz;
  for (let row = 0; row < frequencies.length; row += 1) {
    rows.push([writeDouble(at(frequencies, row)), ...columns.map(({ cell }) => cell(row))].join(','));
  }
  return joinRows(rows);
}
