// Owns the evidence on the launch of plane waves: nothing leaks out of the total-field box, nothing follows the pulse.
// Must not know how the wave is fed.
import { describe } from 'vitest';
import { evidence, type EvidenceRow } from './evidence.ts';
import { at, millimetres, runJob, SECTIONS, traceOf, type SectionCase } from './run-job.ts';

const TAN_POTTER = 'total field on the lattice itself: Tan & Potter, IEEE Trans. Antennas Propag. 58 (2010)';

/**
 * Relative to the peak. The incident line is exact on the lattice, so only single precision is left: 6e-8 at each of the
 * 300 steps a wave needs to cross the sheet, adding up at random to 1e-6; ten times that (-100 dB) is allowed.
 */
const SILENCE = 1e-5;

const ANGLES = [0, 30, 135, -75] as const;

/** From 120 cells per wavelength down to 15: the low end is where an echo from the end of a line would show. */
function emptyJob(kind: SectionCase, degrees: number) {
  return {
    guidewall: 1,
    section: kind.section,
    band: { from: '2.5 GHz', to: '20 GHz', points: 2 },
    sheet: { width: millimetres(160), height: millimetres(120) },
    grid: { cells: { x: '1 mm', y: '1 mm' } },
    drives: [{ kind: 'plane wave', angle: `${degrees} deg` }],
    probes: [
      { id: 'inside', at: at(80, 60) },
      // Between the box, three cells inside the edges, and the edges.
      { id: 'left', at: at(1, 60) },
      { id: 'right', at: at(159, 60) },
      { id: 'corner', at: at(1, 119) },
    ],
    reference: 'none',
    stop: { decay: 'never', after: '5 ns' },
  };
}

function peakOf(samples: Float32Array): number {
  return samples.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
}

async function listen(kind: SectionCase): Promise<readonly EvidenceRow[]> {
  const rows: EvidenceRow[] = [];
  for (const degrees of ANGLES) {
    const record = await runJob(emptyJob(kind, degrees));
    const inside = traceOf(record, 'inside', kind.axial);
    const peak = peakOf(inside);
    // The pulse lasts 0.38 ns and crosses the sheet's diagonal in 0.67 ns.
    const after = peakOf(inside.subarray(Math.ceil(1.2e-9 / record.dtSeconds)));
    const outside = Math.max(...['left', 'right', 'corner'].map((id) => peakOf(traceOf(record, id, kind.axial))));
    const common = { source: TAN_POTTER, unit: '', expected: 0, tolerance: SILENCE };
    rows.push({ ...common, case: `field outside the box over the peak inside, ${degrees} deg`, found: outside / peak });
    rows.push({ ...common, case: `field after the pulse over its peak, ${degrees} deg`, found: after / peak });
  }
  return rows;
}

describe('the launch of plane waves', () => {
  for (const kind of SECTIONS) {
    evidence(`a plane wave fills its box alone and leaves nothing behind, ${kind.section}`, () => listen(kind));
  }
});
