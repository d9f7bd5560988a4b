// Owns the evidence on what the update keeps: energy in a closed box, and the flux through every closed loop of the lattice.
// Must not know how a run is driven or read.
import { describe } from 'vitest';
import { evidence, type EvidenceRow } from './evidence.ts';
import { at, edges, millimetres, ownMaterial, SECTIONS, type SectionCase } from './run-job.ts';
import { coefficientOf, fillWithNoise, openSheet, type SteppedSheet } from './stepped-sheet.ts';

const STEPS = 100_000;
const LEAPFROG = 'leapfrog energy u(n)^2/bu + v(n-1/2) v(n+1/2)/bv: Taflove & Hagness, ch. 4; Yee 1966';
const YEE = 'div B = 0 of the Yee lattice: Yee 1966; Taflove & Hagness, ch. 3';

const FILLED_PARTS = [
  { kind: 'disc', material: 'rod glass', centre: at(15.2, 12.1), radius: millimetres(7.3) },
  { kind: 'rectangle', material: 'ferrite', from: at(25.4, 5.3), to: at(38.8, 21.6) },
  { kind: 'rectangle', from: at(20, 25), to: at(30, 29) },
];

/** A closed box of 48 by 36 cells whose drive stays silent: the fields are set by hand. */
function boxJob(kind: SectionCase, parts: readonly object[], courant: number) {
  return {
    guidewall: 1,
    section: kind.section,
    band: { from: '1 GHz', to: '10 GHz', points: 2 },
    sheet: { width: millimetres(48), height: millimetres(36), edges: edges('metal', 'metal') },
    materials: [ownMaterial('rod glass', 4), ownMaterial('ferrite', 2, 3)],
    parts,
    grid: { cells: { x: '1 mm', y: '1 mm' }, courant },
    drives: [
      { kind: 'line current', at: at(5, 5), waveform: { kind: 'samples', name: 'silence', times: [0, 1e-12], values: [0, 0] } },
    ],
    reference: 'none',
    stop: { decay: 'never', after: '1 ns' },
  };
}

/** The invariant of the lossless update over one step, which it advances; in double precision from the single fields. */
function advanceAndSumEnergy(sheet: SteppedSheet): number {
  const before: number[] = [];
  eachUnknown(sheet, (field, j, i) => {
    if (field !== 'u') before.push(sheet.get(field, j, i));
  });
  sheet.advance(1);
  let energy = 0;
  let link = 0;
  eachUnknown(sheet, (field, j, i) => {
    const other = field === 'u' ? sheet.get('u', j, i) : (before[link++] ?? NaN);
    const b = coefficientOf(sheet, field, j, i);
    if (b > 0) energy += (sheet.get(field, j, i) * other) / b;
  });
  return energy;
}

function eachUnknown(sheet: SteppedSheet, visit: (field: 'u' | 'vx' | 'vy', j: number, i: number) => void): void {
  for (let j = 0; j <= sheet.rows; j++) {
    for (let i = 0; i <= sheet.columns; i++) for (const field of ['u', 'vx', 'vy'] as const) visit(field, j, i);
  }
}

async function compareEnergy(kind: SectionCase): Promise<readonly EvidenceRow[]> {
  const rows: EvidenceRow[] = [];
  for (const { name, parts } of [
    { name: 'an empty box', parts: [] },
    { name: 'a box with dielectric, magnetic and metal parts', parts: FILLED_PARTS },
  ]) {
    const sheet = await openSheet(boxJob(kind, parts, 0.99));
    fillWithNoise(sheet, 7);
    const first = advanceAndSumEnergy(sheet);
    sheet.advance(STEPS - 1);
    const found = advanceAndSumEnergy(sheet) / first;
    // 1e-4 is the aim. Rounding to 6e-8 a step, at random, over 1e5 steps and 1700 cells comes to about 1e-6.
    rows.push({
      case: `energy after 1e5 steps over energy at the start, ${name}`,
      source: LEAPFROG,
      unit: '',
      expected: 1,
      found,
      tolerance: 1e-4,
    });
  }
  return rows;
}

/**
 * Net flux out of the cell between four unknowns u, in units of flux = v/b: v/b is B (or D) times the side it crosses, up to
 * one constant. Each of the four u enters the sum of the four updates twice, with opposite signs.
 */
function netFlux(sheet: SteppedSheet, j: number, i: number): number | null {
  const links = [
    ['vx', j, i, 1],
    ['vx', j, i - 1, -1],
    ['vy', j, i, 1],
    ['vy', j - 1, i, -1],
  ] as const;
  let sum = 0;
  for (const [field, row, column, sign] of links) {
    const b = coefficientOf(sheet, field, row, column);
    // A link on metal: its surface carries charge, which is where D may begin.
    if (b === 0) return null;
    sum += (sign * sheet.get(field, row, column)) / b;
  }
  return sum;
}

function largestFlux(sheet: SteppedSheet): { net: number; single: number; loops: number; moving: number } {
  const found = { net: 0, single: 0, loops: 0, moving: 0 };
  for (let j = 1; j < sheet.rows; j++) {
    for (let i = 1; i < sheet.columns; i++) {
      const net = netFlux(sheet, j, i);
      if (net === null) continue;
      const single = Math.abs(sheet.get('vx', j, i) / coefficientOf(sheet, 'vx', j, i));
      found.loops++;
      if (single > 0) found.moving++;
      found.net = Math.max(found.net, Math.abs(net));
      found.single = Math.max(found.single, single);
    }
  }
  return found;
}

function fluxName(kind: SectionCase): string {
  return kind.axial === 'Ez' ? 'B' : 'D';
}

/**
 * With c dt / h = 1/2 the coefficients of empty space are exactly 1/4 and 1, and from u = 1 at one node all fields are whole
 * multiples of 2^-2n after n steps: 8 steps need 16 of the 24 bits, so nothing is ever rounded and zero means zero.
 */
async function compareExactly(kind: SectionCase): Promise<readonly EvidenceRow[]> {
  const block = [{ kind: 'rectangle', from: at(20, 14), to: at(23, 20) }];
  const sheet = await openSheet(boxJob(kind, block, Math.SQRT1_2));
  sheet.set('u', 18, 26, 1);
  sheet.advance(8);
  const { net, loops, moving } = largestFlux(sheet);
  // The pulse spreads over a diamond of 8 cells to each side, some of it cut off by the block.
  if (moving < 90) throw new Error(`The wave has reached only ${moving} loops.`);
  return [
    {
      case: 'b of u times b of a link, empty space',
      source: '(c dt/h)^2',
      unit: '',
      expected: 0.25,
      found: coefficientOf(sheet, 'u', 5, 5) * coefficientOf(sheet, 'vx', 5, 5),
      tolerance: 0,
    },
    {
      case: `largest |div ${fluxName(kind)}| over ${loops} loops, arithmetic without rounding`,
      source: YEE,
      unit: '',
      expected: 0,
      found: net,
      tolerance: 0,
    },
  ];
}

async function compareRounded(kind: SectionCase): Promise<readonly EvidenceRow[]> {
  const steps = 2000;
  const sheet = await openSheet(boxJob(kind, FILLED_PARTS, 0.99));
  fillWithNoise(sheet, 11);
  sheet.advance(steps);
  const { net, single, loops } = largestFlux(sheet);
  const name = `largest |div ${fluxName(kind)}| over the largest flux, ${loops} loops, ${steps} steps with media and metal`;
  // Four links, three roundings of at most 2^-24 of the flux each a step, adding up at random.
  const tolerance = 4 * 3 * 2 ** -24 * Math.sqrt(steps);
  return [{ case: name, source: YEE, unit: '', expected: 0, found: net / single, tolerance }];
}

describe('what the update keeps', () => {
  for (const kind of SECTIONS) {
    evidence(`a closed lossless box keeps its energy over 1e5 steps, ${kind.section}`, () => compareEnergy(kind));
    evidence(`the divergence of ${fluxName(kind)} is exactly zero, ${kind.section}`, () => compareExactly(kind));
    evidence(`the divergence of ${fluxName(kind)} stays at rounding level among media and metal, ${kind.section}`, () =>
      compareRounded(kind),
    );
  }
});
