// Owns the words for what a run will take: cells, memory, step, time.
// Must not know how it is estimated.
import { formatQuantity } from '../../base/quantity.ts';
import type { Estimate } from '../../engine/estimate.ts';

/** A number stays on the line of its unit: "330 nm". */
export function keepUnits(text: string): string {
  return text.replaceAll(/([\d=]) (?=\S)/g, '$1\u00a0');
}

/** Thin spaces between thousands. */
export function writeCount(count: number): string {
  return String(Math.round(count)).replaceAll(/\B(?=(\d{3})+$)/g, '\u202f');
}

export function writeBytes(bytes: number): string {
  const [scaled, unit] = bytes >= 1e9 ? [bytes / 1e9, 'GB'] : bytes >= 1e6 ? [bytes / 1e6, 'MB'] : [bytes / 1e3, 'kB'];
  return `${Number(scaled.toPrecision(scaled < 10 ? 2 : 3))} ${unit}`;
}

export function writeDuration(seconds: number): string {
  if (seconds < 0.95) return `${Math.max(0.1, Number(seconds.toFixed(1)))} s`;
  if (seconds < 120) return `${Math.round(seconds)} s`;
  return seconds < 7200 ? `${Math.round(seconds / 60)} min` : `${Number((seconds / 3600).toPrecision(2))} h`;
}

export function describeCells({ cellsX, cellsY, dxMetres, dyMetres }: Estimate): string {
  const [dx, dy] = [formatQuantity(dxMetres, 'length', 4), formatQuantity(dyMetres, 'length', 4)];
  return `${writeCount(cellsX)} by ${writeCount(cellsY)} cells of ${dx === dy ? dx : `${dx} by ${dy}`}`;
}

export function describeCost({ cellsTotal, memoryBytes, dtSeconds, stepLimit, secondsAtMost }: Estimate): string {
  const step = formatQuantity(dtSeconds, 'time', 4);
  return (
    `${writeCount(cellsTotal)} cells with the absorbers, up to ${writeBytes(memoryBytes)}; a step of ${step}, ` +
    `at most ${writeCount(stepLimit)} of them in ${writeDuration(secondsAtMost)}`
  );
}

export function describeSharpness({ cellsPerShortestWavelength, phaseErrorDegrees }: Estimate): string {
  const cells = Number(cellsPerShortestWavelength.toPrecision(3));
  return `${cells} cells per shortest wavelength: the wave lags by ${Number(phaseErrorDegrees.toPrecision(2))}\u00b0 in each`;
}
