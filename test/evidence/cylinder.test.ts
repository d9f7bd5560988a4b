// Owns the evidence on round bodies: the field about a metal and a dielectric cylinder against the series of cylinder waves.
// Must not know how the engine steps.
import { describe } from 'vitest';
import { C0 } from '../../src/base/constants.ts';
import { magnitude, subtract, type Complex } from '../oracles/complex.ts';
import { insertionAround, type Cylinder, type CylinderMedium } from '../oracles/cylinder-scattering.ts';
import { evidence, type EvidenceRow } from './evidence.ts';
import { at, insertionOf, millimetres, ownMaterial, SECTIONS, type SectionCase } from './run-job.ts';

const SERIES =
  'cylinder series: Harrington, Time-Harmonic Electromagnetic Fields, 5-9; Balanis, Advanced Engineering Electromagnetics, 11.5';

/** Millimetres. ka runs from 2.1 to 4.2 over the band; 0.5 mm is 60 cells per wavelength at its top, 30 in the dielectric. */
const RADIUS = 20;
const CELL = 0.5;
const SHEET = 100;
const RING = 32;
const BEARINGS = [0, 45, 90, 135, 180] as const;
/** The wave travels at 30 degrees, so that nothing lines up with the lattice. */
const TRAVEL = 30;

const DIELECTRIC = { epsilonRelative: 4, muRelative: 1 };

/** Ratio of total to incident field, one list over the band for each bearing. */
interface Ring {
  readonly frequenciesHertz: readonly number[];
  readonly ratios: readonly (readonly Complex[])[];
}

function cylinderJob(kind: SectionCase, medium: CylinderMedium, cell: number) {
  const materials = medium === 'metal' ? [] : [ownMaterial('rod', medium.epsilonRelative, medium.muRelative)];
  return {
    guidewall: 1,
    section: kind.section,
    band: { from: '5 GHz', to: '10 GHz', points: 26 },
    sheet: { width: millimetres(SHEET), height: millimetres(SHEET), origin: at(SHEET / 2, SHEET / 2) },
    materials,
    parts: [
      {
        kind: 'disc',
        material: medium === 'metal' ? 'perfect-metal' : 'rod',
        centre: at(0, 0),
        radius: millimetres(RADIUS),
        leftOutOfReference: true,
      },
    ],
    grid: { cells: { x: millimetres(cell), y: millimetres(cell) } },
    drives: [{ kind: 'plane wave', angle: `${TRAVEL} deg` }],
    probes: BEARINGS.map((bearing) => {
      const angle = ((TRAVEL + bearing) * Math.PI) / 180;
      return { id: `at ${bearing}`, at: at(RING * Math.cos(angle), RING * Math.sin(angle)) };
    }),
    // The dielectric rings: 15 ns leave less than 1e-3 of its sharpest resonance in the band.
    stop: { decay: 'never', after: medium === 'metal' ? '5 ns' : '15 ns' },
  };
}

function measure(kind: SectionCase, medium: CylinderMedium, cell: number): Promise<Ring> {
  const ids = BEARINGS.map((bearing) => `at ${bearing}`);
  return insertionOf(cylinderJob(kind, medium, cell), ids, kind.axial);
}

function series(kind: SectionCase, medium: CylinderMedium, radius: number, frequenciesHertz: readonly number[]): Ring {
  const cylinder: Cylinder = { axial: kind.axial === 'Ez' ? 'E' : 'H', radiusMetres: radius * 1e-3, medium };
  const ratios = BEARINGS.map((bearing) =>
    frequenciesHertz.map((f) => insertionAround(cylinder, (2 * Math.PI * f) / C0, RING * 1e-3, (bearing * Math.PI) / 180)),
  );
  return { frequenciesHertz, ratios };
}

/** Largest distance in the complex plane over the band, one for each bearing. */
function distances(one: Ring, other: Ring): readonly number[] {
  return one.ratios.map((list, n) =>
    list.reduce((most, value, k) => Math.max(most, magnitude(subtract(value, other.ratios[n]?.[k] ?? [NaN, NaN]))), 0),
  );
}

function makeRows(found: readonly number[], tolerance: number): readonly EvidenceRow[] {
  return BEARINGS.map((bearing, n) => ({
    case: `largest |H - series| from 5 to 10 GHz, ${bearing} deg from the direction of travel`,
    source: SERIES,
    unit: '',
    expected: 0,
    found: found[n] ?? NaN,
    tolerance,
  }));
}

/**
 * Metal lies on grid lines, so a round surface is a staircase within half a cell of the drawn one: the largest change that
 * half a cell of radius makes anywhere on the ring is allowed.
 */
async function compareMetal(kind: SectionCase): Promise<readonly EvidenceRow[]> {
  const found = await measure(kind, 'metal', CELL);
  const exact = series(kind, 'metal', RADIUS, found.frequenciesHertz);
  const shifts = [-CELL / 2, CELL / 2].map((shift) => series(kind, 'metal', RADIUS + shift, found.frequenciesHertz));
  return makeRows(distances(found, exact), Math.max(...shifts.flatMap((shifted) => distances(shifted, exact))));
}

/**
 * The lattice slows the wave in the rod by up to (k h)^2/24 = 1.8e-3 of its speed at 30 cells per wavelength, as if the
 * permittivity were off by twice that: the largest change this makes anywhere on the ring is allowed.
 */
async function compareDielectric(kind: SectionCase): Promise<readonly EvidenceRow[]> {
  const [coarse, fine] = [await measure(kind, DIELECTRIC, 2 * CELL), await measure(kind, DIELECTRIC, CELL)];
  const exact = series(kind, DIELECTRIC, RADIUS, fine.frequenciesHertz);
  const shifts = [-0.0036, 0.0036].map((shift) => {
    const medium = { ...DIELECTRIC, epsilonRelative: DIELECTRIC.epsilonRelative * (1 + shift) };
    return series(kind, medium, RADIUS, fine.frequenciesHertz);
  });
  const found = distances(fine, exact);
  const order = Math.log2(Math.max(...distances(coarse, exact)) / Math.max(...found));
  return [
    ...makeRows(found, Math.max(...shifts.flatMap((shifted) => distances(shifted, exact)))),
    {
      // One pair of grids tells the order to about a third: the interface meets the cells of each grid differently.
      case: 'order in the cell size of the largest |H - series|, cells of 1 mm and 0.5 mm',
      source: 'second order of the anisotropic mean: Farjadpour et al., Opt. Lett. 31 (2006)',
      unit: '',
      expected: 2,
      found: order,
      tolerance: 0.5,
    },
  ];
}

describe('scattering by cylinders', () => {
  for (const kind of SECTIONS) {
    evidence(`a metal cylinder scatters as the series says, ${kind.section}`, () => compareMetal(kind));
    evidence(`a cylinder of permittivity 4 scatters as the series says, ${kind.section}`, () => compareDielectric(kind));
  }
});
