// Owns the evidence on the speed of waves: free space, filled space, and the lattice's own dispersion at three angles.
// Must not know how the engine steps.
import { describe } from 'vitest';
import { C0 } from '../../src/base/constants.ts';
import type { RunRecord } from '../../workers/protocol.ts';
import { yeeWavenumber, type YeeLattice } from '../oracles/yee-lattice.ts';
import { evidence, type EvidenceRow } from './evidence.ts';
import { at, edges, millimetres, ownMaterial, ratioOf, runJob, SECTIONS, spectrumOf, type SectionCase } from './run-job.ts';

/**
 * Single precision: the coefficients are rounded to 6e-8, the field adds 6e-8 a step at random (2e-6 rad after 1000 steps,
 * over 10 rad of travel or more). Together 2e-7 of the wavenumber; five times that is allowed.
 */
const ROUNDING = 1e-6;

const TAFLOVE = 'Taflove & Hagness, Computational Electrodynamics, ch. 4';

function latticeOf(record: RunRecord, speed: number): YeeLattice {
  const { dxMetres, dyMetres } = record.estimate;
  return { dxMetres, dyMetres, dtSeconds: record.dtSeconds, speed };
}

/** Wavenumber between two probes at a listed frequency; `near` only picks the turn of the phase. */
function wavenumberBetween(record: RunRecord, kind: SectionCase, frequencyHertz: number, metres: number, near: number): number {
  const [ratio] = ratioOf(spectrumOf(record, 'far', kind.axial), spectrumOf(record, 'near', kind.axial)).filter(
    (_, k) => Math.abs((record.frequenciesHertz[k] ?? 0) - frequencyHertz) < 1,
  );
  if (ratio === undefined) throw new Error(`The record holds no ${frequencyHertz} Hz.`);
  const phase = -Math.atan2(ratio[1], ratio[0]);
  const turns = Math.round((near * metres - phase) / (2 * Math.PI));
  return (phase + 2 * Math.PI * turns) / metres;
}

/** A long channel in which the wave fills the height: it passes both probes before anything can come back from the far end. */
function channelJob(
  kind: SectionCase,
  bandGigahertz: readonly [number, number],
  material: ReturnType<typeof ownMaterial>,
  after: string,
) {
  return {
    guidewall: 1,
    section: kind.section,
    band: { from: `${bandGigahertz[0]} GHz`, to: `${bandGigahertz[1]} GHz`, points: 2 },
    sheet: {
      width: millimetres(1500),
      height: millimetres(8),
      background: material.id,
      edges: edges('absorbing', kind.axial === 'Ez' ? 'magnetic' : 'metal'),
    },
    materials: [material],
    grid: { cells: { x: '1 mm', y: '1 mm' } },
    drives: [{ kind: 'plane wave' }],
    probes: [
      { id: 'near', at: at(300, 4) },
      { id: 'far', at: at(900, 4) },
    ],
    reference: 'none',
    stop: { decay: 'never', after },
  };
}

describe('the speed of waves', () => {
  for (const kind of SECTIONS) {
    evidence(`a wave runs at 1/sqrt(mu eps), ${kind.section}`, async () => {
      const rows: EvidenceRow[] = [];
      const media = [
        { name: 'vacuum', material: ownMaterial('medium', 1), index: 1, after: '6 ns' },
        {
          name: 'permittivity 2.25, permeability 1.6',
          material: ownMaterial('medium', 2.25, 1.6),
          index: Math.sqrt(3.6),
          after: '10 ns',
        },
      ];
      for (const { name, material, index, after } of media) {
        const record = await runJob(channelJob(kind, [1, 5], material, after));
        const expected = C0 / index;
        const k = wavenumberBetween(record, kind, 1e9, 0.6, (2e9 * Math.PI) / expected);
        // The lattice slows a wave along an axis by (k dx)^2/24 (1 - (c dt/dx)^2) of its speed, less than (k dx)^2/24.
        const tolerance = expected * ((k * 1e-3) ** 2 / 24 + ROUNDING);
        const source = 'c = 1/sqrt(mu0 eps0), SI definition of the metre';
        rows.push({
          case: `phase velocity at 1 GHz, ${name}`,
          source,
          unit: 'm/s',
          expected,
          found: (2e9 * Math.PI) / k,
          tolerance,
        });
      }
      return rows;
    });

    evidence(`a wave in a channel has the wavenumber of the Yee lattice along its axis, ${kind.section}`, async () => {
      const record = await runJob(channelJob(kind, [5, 25], ownMaterial('medium', 1), '5 ns'));
      return [5, 25].map((gigahertz): EvidenceRow => {
        const omega = 2e9 * Math.PI * gigahertz;
        const expected = yeeWavenumber(latticeOf(record, C0), omega, 0);
        const found = wavenumberBetween(record, kind, gigahertz * 1e9, 0.6, expected);
        const cells = (C0 / (gigahertz * 1e9) / 1e-3).toFixed(0);
        return {
          case: `0 deg, ${cells} cells per wavelength`,
          source: TAFLOVE,
          unit: 'rad/m',
          expected,
          found,
          tolerance: expected * ROUNDING,
        };
      });
    });

    evidence(
      `a plane wave in a total-field box has the wavenumber of the Yee lattice at three angles, ${kind.section}`,
      async () => {
        const rows: EvidenceRow[] = [];
        // The probes stand whole cells apart along the direction of travel, so that reading between nodes cancels.
        const travels = [
          { degrees: 0, cells: [180, 0] },
          { degrees: Math.atan2(1, 2) * (180 / Math.PI), cells: [160, 80] },
          { degrees: 45, cells: [150, 150] },
        ] as const;
        for (const { degrees, cells } of travels) {
          const record = await runJob({
            guidewall: 1,
            section: kind.section,
            band: { from: '10 GHz', to: '25 GHz', points: 2 },
            sheet: { width: millimetres(300), height: millimetres(300) },
            grid: { cells: { x: '1 mm', y: '1 mm' } },
            drives: [{ kind: 'plane wave', angle: `${degrees} deg` }],
            probes: [
              { id: 'near', at: at(60, 60) },
              { id: 'far', at: at(60 + cells[0], 60 + cells[1]) },
            ],
            reference: 'none',
            stop: { decay: 'never', after: '2.5 ns' },
          });
          const metres = 1e-3 * Math.hypot(...cells);
          for (const gigahertz of [10, 25]) {
            const expected = yeeWavenumber(latticeOf(record, C0), 2e9 * Math.PI * gigahertz, (degrees * Math.PI) / 180);
            const found = wavenumberBetween(record, kind, gigahertz * 1e9, metres, expected);
            const name = `${degrees.toFixed(1)} deg, ${(C0 / (gigahertz * 1e9) / 1e-3).toFixed(0)} cells per wavelength`;
            rows.push({ case: name, source: TAFLOVE, unit: 'rad/m', expected, found, tolerance: expected * ROUNDING });
          }
        }
        return rows;
      },
    );
  }
});
