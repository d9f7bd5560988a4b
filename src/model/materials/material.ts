// Owns what a library material is and how it becomes the constants of a medium at one frequency.
// Must not know which materials there are, jobs, or the grid.
import { EPS0, MU0 } from '../../base/constants.ts';
import { formatQuantity } from '../../base/quantity.ts';
import type { Medium } from '../job.ts';

export type MaterialGroup = 'space' | 'metal' | 'building material' | 'ground' | 'dielectric' | 'liquid' | 'own';

type MaterialLaw =
  /** Perfect conductor. */
  | { readonly kind: 'perfect metal' }
  /** Good conductor of known conductivity, S/m: computed as a perfect one, its skin depth is told. */
  | { readonly kind: 'metal'; readonly conductivity: number; readonly permeability: number }
  | {
      readonly kind: 'constant';
      readonly permittivity: number;
      readonly permeability: number;
      /** S/m */
      readonly conductivity: number;
      /** ohm/m */
      readonly magneticLoss: number;
    }
  /** eps_r = a f^b, sigma = c f^d in S/m, f in GHz (Rec. ITU-R P.2040). */
  | { readonly kind: 'power law'; readonly a: number; readonly b: number; readonly c: number; readonly d: number }
  | { readonly kind: 'loss tangent'; readonly permittivity: number; readonly lossTangent: number }
  /** eps = epsInfinite + (epsStatic - epsInfinite) / (1 + jwt). */
  | { readonly kind: 'debye'; readonly epsStatic: number; readonly epsInfinite: number; readonly tauSeconds: number };

export interface LibraryMaterial {
  readonly id: string;
  readonly name: string;
  readonly group: MaterialGroup;
  readonly law: MaterialLaw;
  readonly source: string;
  /** Frequencies the numbers are meant for, Hz. */
  readonly validity: readonly [fromHertz: number, toHertz: number];
  readonly note: string;
}

const PERFECT_METAL: Medium = { metal: true, epsilonRelative: 1, muRelative: 1, sigma: 0, sigmaMagnetic: 0 };

export function isMetal(material: LibraryMaterial): boolean {
  return material.law.kind === 'metal' || material.law.kind === 'perfect metal';
}

/** Constants at one frequency; losses that vary with frequency become the conductivity they amount to there. */
export function mediumOf(material: LibraryMaterial, frequencyHertz: number): Medium {
  const { law } = material;
  const omega = 2 * Math.PI * frequencyHertz;
  switch (law.kind) {
    case 'perfect metal':
    case 'metal':
      return PERFECT_METAL;
    case 'constant':
      return {
        metal: false,
        epsilonRelative: law.permittivity,
        muRelative: law.permeability,
        sigma: law.conductivity,
        sigmaMagnetic: law.magneticLoss,
      };
    case 'power law': {
      const gigahertz = frequencyHertz / 1e9;
      return {
        metal: false,
        // Never below 1: the law is used outside its range with a warning, and the time stepper needs c as the fastest wave.
        epsilonRelative: Math.max(1, law.a * gigahertz ** law.b),
        muRelative: 1,
        sigma: law.c * gigahertz ** law.d,
        sigmaMagnetic: 0,
      };
    }
    case 'loss tangent':
      return {
        metal: false,
        epsilonRelative: law.permittivity,
        muRelative: 1,
        sigma: omega * EPS0 * law.permittivity * law.lossTangent,
        sigmaMagnetic: 0,
      };
    case 'debye': {
      const x = omega * law.tauSeconds;
      const strength = (law.epsStatic - law.epsInfinite) / (1 + x * x);
      return {
        metal: false,
        epsilonRelative: law.epsInfinite + strength,
        muRelative: 1,
        sigma: omega * EPS0 * strength * x,
        sigmaMagnetic: 0,
      };
    }
  }
}

/** Metres; sqrt(2 / (omega mu sigma)), Jackson sec. 5.18. */
export function skinDepthMetres(conductivity: number, permeability: number, frequencyHertz: number): number {
  return Math.sqrt(1 / (Math.PI * frequencyHertz * MU0 * permeability * conductivity));
}

/** How the run will treat the material, as the end of a sentence. Empty when there is nothing to say. */
export function describeTreatment(material: LibraryMaterial, frequencyHertz: number): string {
  const { law } = material;
  const at = formatQuantity(frequencyHertz, 'frequency', 4);
  switch (law.kind) {
    case 'perfect metal':
      return '';
    case 'metal': {
      const depth = formatQuantity(skinDepthMetres(law.conductivity, law.permeability, frequencyHertz), 'length', 2);
      return `treated as perfect metal; its skin depth at ${at} is ${depth}`;
    }
    case 'constant': {
      if (material.group === 'space') return '';
      const losses = law.conductivity > 0 ? `, \u03c3 = ${formatConductivity(law.conductivity)}` : '';
      return `\u03b5r = ${round(law.permittivity)}${law.permeability === 1 ? '' : `, \u00b5r = ${round(law.permeability)}`}${losses}`;
    }
    default: {
      const medium = mediumOf(material, frequencyHertz);
      return `treated as \u03b5r = ${round(medium.epsilonRelative)}, \u03c3 = ${formatConductivity(medium.sigma)}, its values at ${at}`;
    }
  }
}

function round(value: number): string {
  return String(Number(value.toPrecision(4)));
}

function formatConductivity(sigma: number): string {
  const [scaled, unit] =
    sigma >= 1 || sigma === 0 ? [sigma, 'S/m'] : sigma >= 1e-3 ? [sigma * 1e3, 'mS/m'] : [sigma * 1e6, '\u00b5S/m'];
  return `${String(Number(scaled.toPrecision(3)))} ${unit}`;
}
