// Owns the evidence on closed boxes: resonances on the lattice and in the continuum, for every kind of closed edge.
// Must not know how the engine steps.
import { describe } from 'vitest';
import { C0 } from '../../src/base/constants.ts';
import { boxResonance } from '../oracles/rectangular-guide.ts';
import { findLine } from '../oracles/spectral-line.ts';
import { yeeFrequency } from '../oracles/yee-lattice.ts';
import { evidence, type EvidenceRow } from './evidence.ts';
import { at, edges, millimetres, ownMaterial, runJob, SECTIONS, traceOf, type SectionCase } from './run-job.ts';

const TAFLOVE = 'dispersion relation with k = m pi/a, n pi/b: Taflove & Hagness, ch. 4';
const HARRINGTON = 'f = c/2 sqrt((m/a)^2 + (n/b)^2): Harrington, Time-Harmonic Electromagnetic Fields, 4-3';

/** Inner size in cells of 1 mm; sides without a common measure keep modes apart. */
const A = 34;
const B = 23;
/** The record holds 400 to 1400 periods of the lines looked for. */
const RECORD = '70 ns';

/**
 * Relative. Coefficients in single precision are off by 6e-8; the line is found to 1e-3 bin of 1/70 ns, which is
 * 1.4e4 Hz or 4e-6 of the lowest line (3.3 GHz).
 */
const DISCRETE = 5e-6;

interface BoxCase {
  readonly name: string;
  /** Half-waves along a and b (whole waves along a repeating pair count twice). */
  readonly modes: Readonly<Record<'Ez' | 'Hz', readonly (readonly [m: number, n: number])[]>>;
  readonly permittivity: number;
  /** Lower left inner corner. */
  readonly corner: readonly [number, number];
  readonly sheet: object;
  readonly parts: readonly object[];
}

const OWN_EDGES = { width: millimetres(A), height: millimetres(B) };

const BOXES: readonly BoxCase[] = [
  {
    name: 'metal edges',
    modes: {
      Ez: [
        [1, 1],
        [2, 1],
        [3, 2],
      ],
      Hz: [
        [1, 0],
        [0, 1],
        [2, 1],
        [3, 2],
      ],
    },
    permittivity: 1,
    corner: [0, 0],
    sheet: { ...OWN_EDGES, edges: edges('metal', 'metal') },
    parts: [],
  },
  {
    name: 'a block of metal with an opening of air',
    modes: {
      Ez: [
        [1, 1],
        [2, 1],
      ],
      Hz: [
        [1, 0],
        [2, 1],
      ],
    },
    permittivity: 1,
    corner: [8, 9],
    sheet: { width: millimetres(A + 16), height: millimetres(B + 18), edges: edges('absorbing', 'absorbing') },
    parts: [
      { kind: 'rectangle', from: at(4, 4), to: at(A + 12, B + 14) },
      { kind: 'rectangle', material: 'filling', from: at(8, 9), to: at(A + 8, B + 9) },
    ],
  },
  {
    name: 'metal edges, filled with permittivity 4',
    modes: {
      Ez: [
        [1, 1],
        [2, 1],
      ],
      Hz: [
        [1, 0],
        [2, 1],
      ],
    },
    permittivity: 4,
    corner: [0, 0],
    sheet: { ...OWN_EDGES, background: 'filling', edges: edges('metal', 'metal') },
    parts: [],
  },
  {
    name: 'magnetic edges',
    modes: {
      Ez: [
        [1, 0],
        [0, 1],
        [2, 1],
      ],
      Hz: [
        [1, 1],
        [2, 1],
      ],
    },
    permittivity: 1,
    corner: [0, 0],
    sheet: { ...OWN_EDGES, edges: edges('magnetic', 'magnetic') },
    parts: [],
  },
  {
    name: 'repeating left and right edges, metal above and below',
    modes: {
      Ez: [
        [0, 1],
        [2, 1],
      ],
      Hz: [
        [2, 0],
        [2, 1],
      ],
    },
    permittivity: 1,
    corner: [0, 0],
    sheet: { ...OWN_EDGES, edges: edges('repeating', 'metal') },
    parts: [],
  },
  {
    name: 'metal left and right edges, repeating above and below',
    modes: {
      Ez: [
        [1, 0],
        [1, 2],
      ],
      Hz: [
        [0, 2],
        [1, 2],
      ],
    },
    permittivity: 1,
    corner: [0, 0],
    sheet: { ...OWN_EDGES, edges: edges('metal', 'repeating') },
    parts: [],
  },
];

async function findResonances(kind: SectionCase, box: BoxCase): Promise<readonly EvidenceRow[]> {
  const speed = C0 / Math.sqrt(box.permittivity);
  const modes = box.modes[kind.axial];
  const continuous = modes.map(([m, n]) => boxResonance(A * 1e-3, B * 1e-3, m, n, speed));
  const [x, y] = box.corner;
  const record = await runJob({
    guidewall: 1,
    section: kind.section,
    band: { from: `${Math.min(...continuous) * 0.7} Hz`, to: `${Math.max(...continuous) * 1.1} Hz`, points: 2 },
    sheet: box.sheet,
    materials: [ownMaterial('filling', box.permittivity)],
    parts: box.parts,
    grid: { cells: { x: '1 mm', y: '1 mm' } },
    drives: [{ kind: 'line current', at: at(x + 5.5, y + 3.5) }],
    probes: [{ id: 'inside', at: at(x + 27, y + 19) }],
    reference: 'none',
    stop: { decay: 'never', after: RECORD },
  });
  const trace = traceOf(record, 'inside', kind.axial);
  return modes.flatMap(([m, n], index): EvidenceRow[] => {
    const kx = (m * Math.PI) / (A * 1e-3);
    const ky = (n * Math.PI) / (B * 1e-3);
    const lattice = { dxMetres: 1e-3, dyMetres: 1e-3, dtSeconds: record.dtSeconds, speed };
    const discrete = yeeFrequency(lattice, kx, ky) / (2 * Math.PI);
    const free = continuous[index] ?? NaN;
    const found = findLine(trace, record.dtSeconds, 0.99 * free, 1.005 * free);
    const mode = `${m},${n} (${box.name})`;
    // Second order of the dispersion relation: between -(k h)^2/24 and +(k c dt)^2/24 of the frequency.
    const bend = (Math.hypot(kx, ky) * 1e-3) ** 2 / 24;
    return [
      { case: `lattice mode ${mode}`, source: TAFLOVE, unit: 'Hz', expected: discrete, found, tolerance: DISCRETE * discrete },
      { case: `continuous mode ${mode}`, source: HARRINGTON, unit: 'Hz', expected: free, found, tolerance: bend * free },
    ];
  });
}

describe('closed boxes', () => {
  for (const kind of SECTIONS) {
    for (const box of BOXES) {
      evidence(`a box of ${A} by ${B} cells rings at its resonances: ${box.name}, ${kind.section}`, () =>
        findResonances(kind, box),
      );
    }
  }
});
