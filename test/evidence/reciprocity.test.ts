// Owns the evidence on reciprocity: drive and probe change places on a sheet full of things.
// Must not know how the engine steps.
import { describe } from 'vitest';
import { evidence, type EvidenceRow } from './evidence.ts';
import { at, edges, millimetres, ownMaterial, runJob, SECTIONS, traceOf, type SectionCase } from './run-job.ts';

const LORENTZ = 'Lorentz reciprocity: Harrington, Time-Harmonic Electromagnetic Fields, 3-8';

/**
 * Relative to the peak at the probe. The update is symmetric up to single precision: some 1e-6 of the field at the drive,
 * which is 20 times the field at the probe. 1e-4 is the aim.
 */
const ALLOWED = 1e-4;

/** In millimetres: one pair on unknowns of both sections (whole and half cells of 2 mm), one pair anywhere. */
const PAIRS = [
  { name: 'on half and whole cells', first: [21, 23], second: [97, 61] },
  { name: 'between cells', first: [20.3, 23.7], second: [97.9, 60.4] },
] as const;

function sheetJob(kind: SectionCase, from: readonly [number, number], to: readonly [number, number]) {
  return {
    guidewall: 1,
    section: kind.section,
    band: { from: '2 GHz', to: '10 GHz', points: 2 },
    sheet: { width: millimetres(120), height: millimetres(80), edges: { ...edges('absorbing', 'absorbing'), bottom: 'metal' } },
    materials: [ownMaterial('rod glass', 5, 1), ownMaterial('absorber', 2.5, 1.8, 0.3, 2e3), ownMaterial('ferrite', 3, 4)],
    parts: [
      { kind: 'disc', material: 'rod glass', centre: at(48, 30), radius: millimetres(13.3) },
      { kind: 'polygon', material: 'ferrite', points: [at(66, 12), at(88, 21), at(74, 47)] },
      { kind: 'rectangle', material: 'absorber', from: at(30, 56.6), to: at(70.2, 120) },
      { kind: 'wall', material: 'perfect-metal', points: [at(82, 70), at(82, 44), at(106, 40)], thickness: '4 mm' },
    ],
    grid: { cells: { x: '1 mm', y: '1 mm' } },
    drives: [{ kind: 'line current', at: at(...from) }],
    probes: [{ id: 'there', at: at(...to) }],
    reference: 'none',
    stop: { decay: 'never', after: '3.5 ns' },
  };
}

async function compare(kind: SectionCase, pair: (typeof PAIRS)[number]): Promise<readonly EvidenceRow[]> {
  const there = traceOf(await runJob(sheetJob(kind, pair.first, pair.second)), 'there', kind.axial);
  const back = traceOf(await runJob(sheetJob(kind, pair.second, pair.first)), 'there', kind.axial);
  const peak = there.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  const difference = there.reduce((most, value, n) => Math.max(most, Math.abs(value - (back[n] ?? NaN))), 0);
  const name = `${kind.axial} at B from a current at A against A from B, ${pair.name}: largest difference over the peak`;
  return [{ case: name, source: LORENTZ, unit: '', expected: 0, found: difference / peak, tolerance: ALLOWED }];
}

describe('reciprocity', () => {
  for (const kind of SECTIONS) {
    for (const pair of PAIRS) {
      evidence(`drive and probe may change places on an inhomogeneous sheet, ${pair.name}, ${kind.section}`, () =>
        compare(kind, pair),
      );
    }
  }
});
