// Owns the evidence on slabs that run through the sheet's edges: transmission and reflection against the transfer matrix.
// Must not know how the engine steps.
import { describe } from 'vitest';
import { C0 } from '../../src/base/constants.ts';
import { decibels, divide, magnitude, multiply, phasor, subtract, type Complex } from '../oracles/complex.ts';
import { insertionBehind, makeSlabResponse, type Layer } from '../oracles/layered-slab.ts';
import { evidence, type EvidenceRow } from './evidence.ts';
import { edges, insertionOf, millimetres, ownMaterial, SECTIONS, type SectionCase } from './run-job.ts';

const BORN_WOLF = 'transfer matrix: Born & Wolf, Principles of Optics, 1.6';

/** The aim over an octave, in dB: what a careful measurement can tell. */
const DECIBELS = 0.15;

/**
 * Radians. The phase of the lattice lags by (k h)^2/24 of itself, at 47 cells per wavelength in the densest medium
 * (permittivity 6, 12 GHz, 0.2 mm) 7e-4; over the thickest slab, 1 wavelength, that is 5e-3 rad, and twice that where
 * the wave runs to and fro in it.
 */
const PHASE = 0.01;

/** Millimetres; none of the faces falls on a grid line of 0.2 mm. */
const CELL = 0.2;
const FRONT = 20.07;
const LENGTH = 60;
const SIDE = 8 * CELL;
const PROBE_BEFORE = 8;
const PROBE_BEHIND = 45;

interface Slab {
  readonly name: string;
  readonly layers: readonly Layer[];
}

function layer(millimetresThick: number, epsilonRelative: number, muRelative = 1, sigma = 0, sigmaMagnetic = 0): Layer {
  return { epsilonRelative, muRelative, sigma, sigmaMagnetic, thicknessMetres: millimetresThick * 1e-3 };
}

const SLABS: readonly Slab[] = [
  { name: 'one lossless layer', layers: [layer(4.16, 4)] },
  { name: 'one lossy layer', layers: [layer(9.3, 4, 1, 1)] },
  { name: 'one layer with magnetic loss', layers: [layer(3.43, 1.2, 4, 0, 3e4)] },
  { name: 'three lossless layers', layers: [layer(1.53, 2.2), layer(2.27, 6), layer(1.53, 2.2)] },
  { name: 'three layers, two of them lossy', layers: [layer(3.1, 4, 1, 0.5), layer(2.9, 1), layer(2.3, 3, 2, 0, 2e4)] },
];

function slabJob(kind: SectionCase, slab: Slab, travel: 'right' | 'up') {
  const place = (along: number, across: number): [string, string] =>
    travel === 'right' ? [millimetres(along), millimetres(across)] : [millimetres(across), millimetres(along)];
  const sides = kind.axial === 'Ez' ? 'magnetic' : 'metal';
  let face = FRONT;
  const parts = slab.layers.map((one, n) => {
    const from = face;
    face += one.thicknessMetres * 1e3;
    return { kind: 'rectangle', material: `layer ${n}`, from: place(from, 0), to: place(face, SIDE), leftOutOfReference: true };
  });
  return {
    guidewall: 1,
    section: kind.section,
    band: { from: '6 GHz', to: '12 GHz', points: 61 },
    sheet: {
      width: millimetres(travel === 'right' ? LENGTH : SIDE),
      height: millimetres(travel === 'right' ? SIDE : LENGTH),
      edges: travel === 'right' ? edges('absorbing', sides) : edges(sides, 'absorbing'),
    },
    materials: slab.layers.map((one, n) =>
      ownMaterial(`layer ${n}`, one.epsilonRelative, one.muRelative, one.sigma, one.sigmaMagnetic),
    ),
    parts,
    grid: { cells: { x: millimetres(CELL), y: millimetres(CELL) } },
    drives: [{ kind: 'plane wave', angle: travel === 'right' ? '0 deg' : '90 deg' }],
    probes: [
      { id: 'before', at: place(PROBE_BEFORE, SIDE / 2) },
      { id: 'behind', at: place(PROBE_BEHIND, SIDE / 2) },
    ],
    stop: { decay: 'never', after: '3 ns' },
  };
}

function worst(values: readonly number[]): number {
  return values.reduce((most, value) => (Math.abs(value) > Math.abs(most) ? value : most), 0);
}

async function compare(kind: SectionCase, slab: Slab, travel: 'right' | 'up'): Promise<readonly EvidenceRow[]> {
  const { frequenciesHertz, ratios } = await insertionOf(slabJob(kind, slab, travel), ['before', 'behind'], kind.axial);
  const [before = [], behind = []] = ratios;
  // The slab turns H back with the opposite sign to E.
  const sign = kind.axial === 'Ez' ? 1 : -1;
  const found = frequenciesHertz.map((f, k) => {
    const there = subtract(before[k] ?? [NaN, NaN], [1, 0]);
    const back = phasor((4 * Math.PI * f * (FRONT - PROBE_BEFORE) * 1e-3) / C0);
    const reflection: Complex = multiply([sign, 0], multiply(there, back));
    return { transmission: behind[k] ?? ([NaN, NaN] as const), reflection };
  });
  const expected = frequenciesHertz.map((f) => ({
    transmission: insertionBehind(slab.layers, f),
    reflection: makeSlabResponse(slab.layers, f).reflection,
  }));
  // Near a null of the reflection an error in dB says nothing: the slabs are chosen without one in the octave.
  const least = Math.min(...expected.map((one) => magnitude(one.reflection)));
  if (least < 0.3) throw new RangeError(`${slab.name} reflects as little as ${least} in the octave; choose another thickness.`);
  return (['transmission', 'reflection'] as const).flatMap((quantity): EvidenceRow[] => {
    const quotients = found.map((value, k) => divide(value[quantity], expected[k]?.[quantity] ?? [NaN, NaN]));
    const common = { source: BORN_WOLF, expected: 0 };
    const name = `${quantity} of ${slab.name}, 6 to 12 GHz, wave travelling ${travel}`;
    const rows: EvidenceRow[] = [
      {
        ...common,
        case: `worst error of ${name}`,
        unit: 'dB',
        found: worst(quotients.map((q) => decibels(magnitude(q)))),
        tolerance: DECIBELS,
      },
    ];
    if (quantity === 'transmission') {
      const phase = worst(quotients.map((q) => Math.atan2(q[1], q[0])));
      rows.push({ ...common, case: `worst phase error of ${name}`, unit: 'rad', found: phase, tolerance: PHASE });
    }
    return rows;
  });
}

describe('slabs at normal incidence', () => {
  for (const kind of SECTIONS) {
    for (const slab of SLABS) {
      evidence(`transmission and reflection of ${slab.name} agree with the transfer matrix, ${kind.section}`, () =>
        compare(kind, slab, 'right'),
      );
    }
    const last = SLABS[SLABS.length - 1];
    if (last !== undefined) {
      evidence(`a stack answers a wave that travels upwards as it does any other, ${kind.section}`, () =>
        compare(kind, last, 'up'),
      );
    }
  }
});
