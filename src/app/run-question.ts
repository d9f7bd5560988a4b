// Owns when two jobs ask the same question of the solver.
// Must not know stores, workers, or how a run is made.
import type { Estimate } from '../engine/estimate.ts';
import { hashText } from '../engine/hash.ts';
import type { Job, ResolvedJob } from '../model/job.ts';

/** True when nothing but title and notes differs. Edits share what they leave alone, so identity mostly tells. */
export function asksTheSame(a: Job, b: Job): boolean {
  if (a === b) return true;
  const keys = Object.keys(a) as (keyof Job)[];
  const same = (key: keyof Job): boolean => a[key] === b[key] || JSON.stringify(a[key]) === JSON.stringify(b[key]);
  return keys.every((key) => key === 'title' || key === 'notes' || same(key));
}

/** True when a field computed for `a` lies where `b` has its sheet. */
export function standsOnSameSheet(a: ResolvedJob, b: ResolvedJob): boolean {
  const same = a.sheet.widthMetres === b.sheet.widthMetres && a.sheet.heightMetres === b.sheet.heightMetres;
  return same && a.section === b.section;
}

/**
 * Fingerprint of everything the reference run's numbers hang on. The parts left out act through the grid and the launch alone,
 * which the estimate states; so a wall can be moved without running the reference again.
 */
export function makeReferenceKey(job: ResolvedJob, estimate: Estimate): string {
  const { cellsX, cellsY, dxMetres, dyMetres, dtSeconds, stepLimit, launch } = estimate;
  const parts = job.reference === 'empty sheet' ? [] : job.parts.filter((part) => !part.leftOutOfReference);
  const everything = [
    { cellsX, cellsY, dxMetres, dyMetres, dtSeconds, stepLimit, launch },
    job.section,
    job.band,
    job.sheet,
    job.grid.absorberCells,
    job.drives.map(({ name: _, ...drive }) => drive),
    job.probes.map(({ id, at }) => ({ id, at })),
    job.stop,
    parts.map(({ outline, medium }) => ({ outline, medium })),
  ];
  return hashText(JSON.stringify(everything));
}
