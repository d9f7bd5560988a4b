// Owns the evidence on guides: decay below cutoff, the trade's 27.3 dB per width, the cutoff of standard guides.
// Must not know how the engine steps.
import { describe } from 'vitest';
import { C0 } from '../../src/base/constants.ts';
import { findGuide } from '../../src/model/guides.ts';
import { decibels, magnitude } from '../oracles/complex.ts';
import { guideAttenuation, guideCutoff } from '../oracles/rectangular-guide.ts';
import { findLine } from '../oracles/spectral-line.ts';
import { yeeAttenuation } from '../oracles/yee-lattice.ts';
import { evidence, type EvidenceRow } from './evidence.ts';
import { at, edges, millimetres, ratioOf, runJob, SECTIONS, spectrumOf, traceOf, type SectionCase } from './run-job.ts';

const PRACTICE = '27.3 dB per width far below cutoff: common practice, 20 pi log10(e)';
const POZAR = 'sqrt(kc^2 - k^2): Pozar, Microwave Engineering, 3.3';
const TAFLOVE = 'decay on the lattice: Taflove & Hagness, ch. 4';

/** The guide: 21 cells of 1 mm between metal edges. An odd number puts H out of the plane on a/6 and 5a/6. */
const WIDTH = 21;
const CUTOFF = guideCutoff(WIDTH * 1e-3, C0);
const SOURCE_AT = 30;
const NEAR = SOURCE_AT + 1.5 * WIDTH;
const FAR = SOURCE_AT + 2.5 * WIDTH;
const LENGTH = 240;

/**
 * H out of the plane needs two opposed currents: they leave out the wave without cutoff and, at a/6 and 5a/6, the third
 * order. E out of the plane takes one in the middle: no even orders; the third falls three times as fast, and stands at
 * exp(-2 pi 1.5) = 8e-5 of the first at the near probe. What the far end returns has fallen below 1e-5 at 0.8 of cutoff.
 */
function drivesFor(kind: SectionCase): readonly object[] {
  const current = (y: number, amplitude: string): object => ({ kind: 'line current', at: at(SOURCE_AT + 0.5, y), amplitude });
  if (kind.axial === 'Ez') return [{ kind: 'line current', at: at(SOURCE_AT, WIDTH / 2) }];
  return [current(WIDTH / 6, '1 V'), current((5 * WIDTH) / 6, '-1 V')];
}

/** Decay in Np/m at the listed frequencies; fractions of cutoff. */
async function findDecay(kind: SectionCase, band: readonly [number, number], listed: readonly number[]) {
  const hertz = (fraction: number): string => `${fraction * CUTOFF} Hz`;
  const record = await runJob({
    guidewall: 1,
    section: kind.section,
    band: { from: hertz(band[0]), to: hertz(band[1]), points: 2, listed: listed.map(hertz) },
    sheet: { width: millimetres(LENGTH), height: millimetres(WIDTH), edges: edges('absorbing', 'metal') },
    grid: { cells: { x: '1 mm', y: '1 mm' } },
    drives: drivesFor(kind),
    // Off the middle, where H across the guide is zero by symmetry.
    probes: [
      { id: 'near', at: at(NEAR, WIDTH / 3) },
      { id: 'far', at: at(FAR, WIDTH / 3) },
    ],
    reference: 'none',
    stop: { decay: 'never', after: '20 ns' },
  });
  const ratios = ratioOf(spectrumOf(record, 'far', kind.axial), spectrumOf(record, 'near', kind.axial));
  const decays = listed.map((fraction) => {
    const k = record.frequenciesHertz.findIndex((f) => Math.abs(f - fraction * CUTOFF) < 1);
    return -Math.log(magnitude(ratios[k] ?? [NaN, NaN])) / (WIDTH * 1e-3);
  });
  return { decays, dtSeconds: record.dtSeconds };
}

async function compareDecay(kind: SectionCase): Promise<readonly EvidenceRow[]> {
  const rows: EvidenceRow[] = [];
  const runs = [
    { band: [0.1, 0.5], listed: [0.1, 0.3, 0.5] },
    { band: [0.7, 0.8], listed: [0.7, 0.8] },
  ] as const;
  for (const { band, listed } of runs) {
    const { decays, dtSeconds } = await findDecay(kind, band, listed);
    listed.forEach((fraction, n) => {
      const f = fraction * CUTOFF;
      const found = decays[n] ?? NaN;
      const lattice = { dxMetres: 1e-3, dyMetres: 1e-3, dtSeconds, speed: C0 };
      const discrete = yeeAttenuation(lattice, 2 * Math.PI * f, Math.PI / (WIDTH * 1e-3));
      const free = guideAttenuation(WIDTH * 1e-3, C0, f);
      const where = `at ${fraction} of cutoff, ${kind.section}`;
      // Third order, far end and the drive's remainder above cutoff: below 1e-3 over one width (see drivesFor).
      rows.push({
        case: `decay on the lattice ${where}`,
        source: TAFLOVE,
        unit: 'Np/m',
        expected: discrete,
        found,
        tolerance: 1e-3 * discrete,
      });
      // 1 % is the aim; the lattice itself is off by (kc h)^2/12 = 0.2 %.
      rows.push({ case: `decay ${where}`, source: POZAR, unit: 'Np/m', expected: free, found, tolerance: 0.01 * free });
    });
  }
  return rows;
}

async function comparePerWidth(kind: SectionCase): Promise<readonly EvidenceRow[]> {
  // At a twentieth of cutoff the decay is 0.1 % below its limit.
  const { decays } = await findDecay(kind, [0.05, 0.4], [0.05]);
  const found = decibels(Math.exp((decays[0] ?? NaN) * WIDTH * 1e-3));
  return [
    {
      case: `loss in a length equal to the width, ${kind.section}`,
      source: PRACTICE,
      unit: 'dB',
      expected: 27.3,
      found,
      tolerance: 0.273,
    },
  ];
}

/** Published widths and cutoffs, independent of the program's own table and good to the digits printed there. */
const STANDARD = [
  { iec: 'R 32', widthMillimetres: 72.14, publishedGigahertz: 2.078 },
  { iec: 'R 100', widthMillimetres: 22.86, publishedGigahertz: 6.557 },
  { iec: 'R 220', widthMillimetres: 10.668, publishedGigahertz: 14.051 },
] as const;

/** The lowest line of a slice between magnetic planes across the guide is TE10 at cutoff: no variation along x. */
async function findCutoff(widthMillimetres: number): Promise<number> {
  const a = widthMillimetres;
  const cutoff = guideCutoff(a * 1e-3, C0);
  const record = await runJob({
    guidewall: 1,
    section: 'E out of plane',
    band: { from: `${0.7 * cutoff} Hz`, to: `${1.5 * cutoff} Hz`, points: 2 },
    values: { a: millimetres(a) },
    sheet: { width: 'a/16', height: 'a', edges: edges('magnetic', 'metal') },
    grid: { cells: { x: 'a/64', y: 'a/64' } },
    drives: [{ kind: 'line current', at: ['0 mm', 'a/4'] }],
    probes: [{ id: 'inside', at: ['0 mm', '3*a/8'] }],
    reference: 'none',
    stop: { decay: 'never', after: `${300 / cutoff} s` },
  });
  return findLine(traceOf(record, 'inside', 'Ez'), record.dtSeconds, 0.97 * cutoff, 1.03 * cutoff);
}

async function compareCutoffs(): Promise<readonly EvidenceRow[]> {
  const rows: EvidenceRow[] = [];
  for (const { iec, widthMillimetres, publishedGigahertz } of STANDARD) {
    const guide = findGuide(iec);
    if (guide === undefined) throw new Error(`The library holds no ${iec}.`);
    const source = 'IEC 60153-2';
    rows.push({
      case: `inner width of ${iec}`,
      source,
      unit: 'mm',
      expected: widthMillimetres,
      found: guide.aMetres * 1e3,
      tolerance: 0.005,
    });
    const found = (await findCutoff(guide.aMetres * 1e3)) / 1e9;
    // Printed to 0.5 MHz; the lattice of 64 cells is off by (pi/64)^2/24 = 1e-4.
    const tolerance = 0.0005 + 1e-4 * publishedGigahertz;
    rows.push({ case: `cutoff of ${iec}`, source, unit: 'GHz', expected: publishedGigahertz, found, tolerance });
  }
  return rows;
}

describe('guides', () => {
  for (const kind of SECTIONS) {
    evidence(`a guide below cutoff decays as sqrt(kc^2 - k^2), ${kind.section}`, () => compareDecay(kind));
    evidence(`far below cutoff a guide takes 27.3 dB off per width, ${kind.section}`, () => comparePerWidth(kind));
  }
  evidence('standard guides open at their published cutoff', compareCutoffs);
});
