// Owns the evidence on long runs of open sheets: the energy leaves and does not come back.
// Must not know how the absorber works.
import { describe } from 'vitest';
import { evidence, type EvidenceRow } from './evidence.ts';
import { at, millimetres, ownMaterial, runJob, SECTIONS, type SectionCase } from './run-job.ts';

const KUZUOGLU = 'no late growth with the complex frequency shift: Kuzuoglu & Mittra, IEEE Microw. Guided Wave Lett. 6 (1996)';

/** Single precision leaves the fields at 1e-7 of their peak, the energy at 1e-14 (-140 dB) and a little more; -100 dB is allowed. */
const ALLOWED = 1e-10;

function seamAt(x: number): readonly object[] {
  const half = (from: number, to: number): object => ({ kind: 'wall', points: [at(x, from), at(x, to)], thickness: '2 mm' });
  return [half(-10, 18), half(20, 50)];
}

/** Cells of 1 mm, a hundred to a wavelength at the top of the band: what rings is small beside the wave and close to the edges. */
const CASES = [
  { name: 'an empty sheet', parts: [] },
  { name: 'a seam in the middle', parts: seamAt(30) },
  { name: 'a seam four cells from the absorber', parts: seamAt(55) },
  {
    name: 'a dielectric that runs out through two edges',
    parts: [{ kind: 'rectangle', material: 'slab', from: at(30, -10), to: at(75, 12) }],
  },
] as const;

async function waitLong(kind: SectionCase): Promise<readonly EvidenceRow[]> {
  const rows: EvidenceRow[] = [];
  for (const { name, parts } of CASES) {
    const record = await runJob({
      guidewall: 1,
      section: kind.section,
      band: { from: '0.5 GHz', to: '3 GHz', points: 2 },
      sheet: { width: millimetres(60), height: millimetres(40) },
      materials: [ownMaterial('slab', 6)],
      parts,
      grid: { cells: { x: '1 mm', y: '1 mm' } },
      drives: [{ kind: 'line current', at: at(15, 19) }],
      probes: [{ id: 'inside', at: at(45, 30) }],
      reference: 'none',
      stop: { decay: 'never', after: '234 ns' },
    });
    const found = 10 ** (record.energyDb / 10);
    const steps = `${Math.round(record.steps / 1000)} thousand steps`;
    rows.push({
      case: `energy over its peak after ${steps}, ${name}`,
      source: KUZUOGLU,
      unit: '',
      expected: 0,
      found,
      tolerance: ALLOWED,
    });
  }
  return rows;
}

describe('long runs', () => {
  for (const kind of SECTIONS) {
    evidence(`the energy of a pulse leaves an open sheet for good, ${kind.section}`, () => waitLong(kind));
  }
});
