// Owns what should be said of a good job before it is run: materials out of their range, a reference without difference.
// Must not know the grid or screens.
import { EPS0 } from '../base/constants.ts';
import { formatQuantity, makeQuantityReader } from '../base/quantity.ts';
import type { Job } from './job.ts';
import { findMaterial } from './materials/library.ts';
import type { LibraryMaterial } from './materials/material.ts';
import { mediumOf } from './materials/material.ts';
import { wantsReference } from './reference.ts';

export interface JobRemark {
  readonly code: string;
  readonly message: string;
  readonly path: string;
}

interface Band {
  readonly from: number;
  readonly to: number;
}

/** A permittivity that changes by more than this over the band is worth a word. */
const PERMITTIVITY_SPREAD = 0.05;
/** So is a conductivity that changes by more than this factor in a material that loses more than the loss tangent below. */
const CONDUCTIVITY_FACTOR = 1.5;
const LOSSY_TANGENT = 0.01;

function readBand(job: Job): Band | null {
  const read = makeQuantityReader(job.values);
  const [from, to] = [read(job.band.from, 'frequency'), read(job.band.to, 'frequency')];
  return from.ok && to.ok && from.value > 0 && to.value > from.value ? { from: from.value, to: to.value } : null;
}

function span(from: number, to: number): string {
  return `${formatQuantity(from, 'frequency', 4)} to ${formatQuantity(to, 'frequency', 4)}`;
}

function remarkOnRange(material: LibraryMaterial, band: Band, path: string): JobRemark[] {
  const [from, to] = material.validity;
  if (band.from >= from && band.to <= to) return [];
  const message = `${material.name} is known from ${span(from, to)}; the band is ${span(band.from, band.to)}, so its values are a guess outside.`;
  return [{ code: 'material range', message, path }];
}

function remarkOnSpread(material: LibraryMaterial, band: Band, path: string): JobRemark[] {
  if (material.law.kind === 'constant') return [];
  const centre = (band.from + band.to) / 2;
  const [low, middle, high] = [band.from, centre, band.to].map((frequency) => mediumOf(material, frequency));
  if (low === undefined || middle === undefined || high === undefined || middle.metal) return [];
  const spread = Math.abs(high.epsilonRelative - low.epsilonRelative) / middle.epsilonRelative;
  const tangent = middle.sigma / (2 * Math.PI * centre * EPS0 * middle.epsilonRelative);
  const lossy = tangent > LOSSY_TANGENT && high.sigma > CONDUCTIVITY_FACTOR * low.sigma;
  if (spread <= PERMITTIVITY_SPREAD && !lossy) return [];
  const what = spread > PERMITTIVITY_SPREAD ? (lossy ? 'permittivity and conductivity' : 'permittivity') : 'conductivity';
  const message = `The ${what} of ${material.name} varies over the band; its values at ${formatQuantity(centre, 'frequency', 4)} are used throughout.`;
  return [{ code: 'material spread', message, path }];
}

/** Warnings on the materials in use, each material once. */
export function materialRemarks(job: Job): readonly JobRemark[] {
  const band = readBand(job);
  if (band === null) return [];
  const uses = new Map<string, string>();
  for (const [k, part] of job.parts.entries()) if (!uses.has(part.material)) uses.set(part.material, `parts[${k}].material`);
  if (!uses.has(job.sheet.background)) uses.set(job.sheet.background, 'sheet.background');
  return [...uses].flatMap(([id, path]) => {
    const material = findMaterial(job, id);
    return material === undefined ? [] : [...remarkOnRange(material, band, path), ...remarkOnSpread(material, band, path)];
  });
}

/** Without a part left out there is nothing to compare with. */
export function referenceRemarks(job: Job): readonly JobRemark[] {
  if (job.reference === 'none' || wantsReference(job)) return [];
  const message =
    'Nothing is left out of the reference, so it would be the run itself: it is not made, and there is no insertion ratio.';
  return [{ code: 'reference', message, path: 'reference' }];
}
