// Owns how a place in the job is written in errors and remarks: `parts[2].points[0][1]`.
// Must not know the job.

export type Path = readonly (string | number)[];

export function writePath(path: Path): string {
  return path.map((step, k) => (typeof step === 'number' ? `[${step}]` : k === 0 ? step : `.${step}`)).join('');
}
