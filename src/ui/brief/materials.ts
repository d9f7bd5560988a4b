// Owns how materials are offered and marked in the Brief: groups, swatches, the words on their treatment.
// Must not know the list of materials or how media are computed.
import type { Job } from '../../model/job.ts';
import { findMaterial, MATERIALS } from '../../model/materials/library.ts';
import type { LibraryMaterial, MaterialGroup } from '../../model/materials/material.ts';
import { describeTreatment, isMetal, mediumOf } from '../../model/materials/material.ts';

const GROUPS: readonly (readonly [MaterialGroup, string])[] = [
  ['space', 'Air and vacuum'],
  ['metal', 'Metals'],
  ['building material', 'Building materials'],
  ['ground', 'Ground'],
  ['dielectric', 'Dielectrics, typical: check the data sheet'],
  ['liquid', 'Liquids'],
];

export const MATERIAL_GROUPS: readonly { readonly label: string; readonly materials: readonly LibraryMaterial[] }[] = GROUPS.map(
  ([group, label]) => ({ label, materials: MATERIALS.filter((material) => material.group === group) }),
);

export type Swatch =
  { readonly kind: 'metal' } | { readonly kind: 'space' } | { readonly kind: 'tint'; readonly strength: number };

/** Refractive index at which the tint is full. */
const FULL_TINT = 10;

export function swatchOf(material: LibraryMaterial | undefined, centreHertz: number): Swatch {
  if (material === undefined) return { kind: 'space' };
  if (isMetal(material)) return { kind: 'metal' };
  const { epsilonRelative, muRelative } = mediumOf(material, centreHertz);
  const density = epsilonRelative * muRelative;
  if (density <= 1) return { kind: 'space' };
  return { kind: 'tint', strength: Math.min(1, 0.25 + Math.log(density) / Math.log(FULL_TINT ** 2)) };
}

/** "treated as perfect metal; its skin depth at 3.4 GHz is 1.1 µm", or nothing. */
export function treatmentOf(job: Job, id: string, centreHertz: number): string {
  const material = findMaterial(job, id);
  return material === undefined ? '' : describeTreatment(material, centreHertz);
}
