// Owns the evidence on absorbing edges: what they return, by comparison with a sheet too large for anything to return.
// Must not know how the absorber works.
// Source of the method: J. A. Roden and S. D. Gedney, Microw. Opt. Technol. Lett. 27 (2000) 334, section 4; sheet of 40 by 40
// cells of 1 mm with ten cells of absorber as there (from memory).
import { describe } from 'vitest';
import { evidence, type EvidenceRow } from './evidence.ts';
import { at, millimetres, runJob, SECTIONS, traceOf, type SectionCase } from './run-job.ts';

const RODEN_GEDNEY = 'larger-grid comparison: Roden & Gedney 2000';
const ALLOWED_DECIBELS = -70;

interface AbsorberCase {
  readonly name: string;
  readonly absorberCells: number;
  /** Millimetres, which are cells. */
  readonly width: number;
  readonly height: number;
  readonly topGigahertz: number;
  readonly drive: readonly [number, number];
  readonly probes: readonly (readonly [number, number])[];
}

const SQUARE = {
  width: 40,
  height: 40,
  drive: [20.5, 20.5],
  probes: [
    [20.5, 2.5],
    [2.5, 2.5],
  ],
} as const;

/** Twelve cells are the program's own choice. Ten return -61 dB at the far end of the grazing case. */
const CASES: readonly AbsorberCase[] = [
  { ...SQUARE, name: '40 by 40 cells, 10 absorbing', absorberCells: 10, topGigahertz: 14 },
  { ...SQUARE, name: '40 by 40 cells, 12 absorbing, down to 12 cells per wavelength', absorberCells: 12, topGigahertz: 25 },
  {
    // The far probe sees the long edges under 84 degrees from their normal.
    name: '200 by 24 cells, 12 absorbing, grazing',
    absorberCells: 12,
    width: 200,
    height: 24,
    topGigahertz: 14,
    drive: [12.5, 12.5],
    probes: [
      [100.5, 2.5],
      [190.5, 2.5],
    ],
  },
];

/**
 * Cells added on each side of the larger sheet. A wave crosses at most 0.7 cell a step, so what the larger sheet's own
 * edges return needs 2 x 350 / 0.7 = 1000 steps: the record of 2.3 ns ends at 986.
 */
const MARGIN = 350;

function sheetJob(kind: SectionCase, one: AbsorberCase, margin: number) {
  return {
    guidewall: 1,
    section: kind.section,
    band: { from: '2 GHz', to: `${one.topGigahertz} GHz`, points: 2 },
    sheet: {
      width: millimetres(one.width + 2 * margin),
      height: millimetres(one.height + 2 * margin),
      origin: at(margin, margin),
    },
    grid: { cells: { x: '1 mm', y: '1 mm' }, absorberCells: one.absorberCells },
    drives: [{ kind: 'line current', at: at(...one.drive) }],
    probes: one.probes.map(([x, y], n) => ({ id: `probe ${n}`, at: at(x, y) })),
    reference: 'none',
    stop: { decay: 'never', after: '2.3 ns' },
  };
}

async function compare(kind: SectionCase, one: AbsorberCase): Promise<readonly EvidenceRow[]> {
  const small = await runJob(sheetJob(kind, one, 0));
  const large = await runJob(sheetJob(kind, one, MARGIN));
  return one.probes.map(([x, y], n): EvidenceRow => {
    const near = traceOf(small, `probe ${n}`, kind.axial);
    const free = traceOf(large, `probe ${n}`, kind.axial);
    const peak = free.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
    const error = free.reduce((most, value, k) => Math.max(most, Math.abs(value - (near[k] ?? NaN))), 0);
    return {
      case: `largest return over the largest field at (${x}, ${y}) mm, ${one.name}: at most ${ALLOWED_DECIBELS} dB`,
      source: RODEN_GEDNEY,
      unit: '',
      expected: 0,
      found: error / peak,
      tolerance: 10 ** (ALLOWED_DECIBELS / 20),
    };
  });
}

describe('absorbing edges', () => {
  for (const kind of SECTIONS) {
    for (const one of CASES) {
      evidence(`absorbing edges return less than ${ALLOWED_DECIBELS} dB: ${one.name}, ${kind.section}`, () => compare(kind, one));
    }
  }
});
