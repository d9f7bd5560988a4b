// Owns the evidence on absolute values: fields of a known line current and of a known plane wave, all three components.
// Must not know how drives are put on the lattice or probes read from it.
import { describe } from 'vitest';
import { C0, EPS0, ETA0, MU0 } from '../../src/base/constants.ts';
import type { FieldComponent, RunRecord } from '../../workers/protocol.ts';
import { besselJ, besselY, hankel2 } from '../oracles/bessel.ts';
import { divide, magnitude, multiply, scale, subtract, type Complex } from '../oracles/complex.ts';
import { evidence, type EvidenceRow } from './evidence.ts';
import { at, millimetres, ratioOf, runJob, SECTIONS, spectrumOf, type SectionCase } from './run-job.ts';

const LINE_CURRENT =
  'Ez = -(w mu I/4) H0(kr), Hphi = (k I/4j) H1(kr) and the dual: Harrington, Time-Harmonic Electromagnetic Fields, 5-6';
const PLANE_WAVE = 'E = eta0 H, both across the direction of travel: Pozar, Microwave Engineering, 1.4';

/** Millimetres; cells are 1 mm, 25 to a wavelength at the top of the band. */
const CELL = 1e-3;
const SHEET = 120;

/** In-plane components as they stand in the records: x, then y. */
function planeComponents(kind: SectionCase): readonly [FieldComponent, FieldComponent] {
  return kind.axial === 'Ez' ? ['Hx', 'Hy'] : ['Ex', 'Ey'];
}

/** Field per unit of the drive's amplitude, over the frequencies of the record. */
function response(record: RunRecord, probeId: string, component: FieldComponent): readonly Complex[] {
  const { re, im } = record.driveSpectrum;
  return ratioOf(
    spectrumOf(record, probeId, component),
    Array.from(re, (value, k): Complex => [value, im[k] ?? NaN]),
  );
}

function sheetJob(kind: SectionCase, drive: object, probes: readonly object[]) {
  return {
    guidewall: 1,
    section: kind.section,
    band: { from: '3 GHz', to: '12 GHz', points: 10 },
    sheet: { width: millimetres(SHEET), height: millimetres(SHEET) },
    grid: { cells: { x: '1 mm', y: '1 mm' } },
    drives: [drive],
    probes,
    reference: 'none',
    stop: { decay: 'never', after: '4 ns' },
  };
}

/** Axial field and the component along phi at r, per unit current: A for E out of the plane, V for H. */
function lineCurrentFields(kind: SectionCase, frequencyHertz: number, r: number): { axial: Complex; around: Complex } {
  const omega = 2 * Math.PI * frequencyHertz;
  const k = omega / C0;
  const [j, y] = [besselJ(1, k * r), besselY(1, k * r)];
  const sign = kind.axial === 'Ez' ? 1 : -1;
  return {
    axial: scale(hankel2(j, y, 0), (-omega * (kind.axial === 'Ez' ? MU0 : EPS0)) / 4),
    around: scale(multiply([0, -1], hankel2(j, y, 1)), (sign * k) / 4),
  };
}

/**
 * Relative. The lattice turns the phase by k r (k h)^2/24; in-plane fields are read half-way between two links, which takes
 * (k h)^2/8 off; a cell of the current itself counts as much again.
 */
function lineTolerance(frequencyHertz: number, r: number): number {
  const k = (2 * Math.PI * frequencyHertz) / C0;
  return (k * CELL) ** 2 * ((k * r) / 24 + 2 / 8);
}

async function compareLineCurrent(kind: SectionCase): Promise<readonly EvidenceRow[]> {
  // Both on unknowns of the section: whole cells for Ez, half cells for Hz.
  const [x, y] = kind.axial === 'Ez' ? [60, 60] : [60.5, 60.5];
  const reach = 30;
  const record = await runJob(
    sheetJob(kind, { kind: 'line current', at: at(x, y), amplitude: `2 ${kind.source}` }, [
      { id: 'right', at: at(x + reach, y) },
      { id: 'above', at: at(x, y + reach) },
    ]),
  );
  const r = reach * CELL;
  const [alongX, alongY] = planeComponents(kind);
  const readings = [
    { probe: 'right', component: kind.axial, part: 'axial', sign: 1 },
    { probe: 'right', component: alongY, part: 'around', sign: 1 },
    { probe: 'above', component: kind.axial, part: 'axial', sign: 1 },
    { probe: 'above', component: alongX, part: 'around', sign: -1 },
  ] as const;
  return readings.map(({ probe, component, part, sign }): EvidenceRow => {
    const found = response(record, probe, component);
    // The frequency at which the error stands out most against what is allowed there.
    const share = Array.from(record.frequenciesHertz, (f, k) => {
      const expected = scale(lineCurrentFields(kind, f, r)[part], 2 * sign);
      const error = magnitude(subtract(divide(found[k] ?? [NaN, NaN], expected), [1, 0]));
      return error / lineTolerance(f, r);
    });
    return {
      case: `${component} ${probe} of a line current of 2 ${kind.source}, 3 to 12 GHz: error over the lattice's own`,
      source: LINE_CURRENT,
      unit: '',
      expected: 0,
      found: Math.max(...share),
      tolerance: 1,
    };
  });
}

async function comparePlaneWave(kind: SectionCase): Promise<readonly EvidenceRow[]> {
  const rows: EvidenceRow[] = [];
  for (const degrees of [0, 30, 135, -75]) {
    const record = await runJob(
      sheetJob(kind, { kind: 'plane wave', amplitude: '3 V/m', angle: `${degrees} deg` }, [{ id: 'inside', at: at(60, 60) }]),
    );
    const [alongX, alongY] = planeComponents(kind);
    const [c, s] = [Math.cos((degrees * Math.PI) / 180), Math.sin((degrees * Math.PI) / 180)];
    const axial = response(record, 'inside', kind.axial);
    const top = axial.length - 1;
    // Every field is read within half a cell of an unknown, in both directions, and the lattice's own impedance is off by less.
    const tolerance = 2 * (((2 * Math.PI * 12e9) / C0) * CELL) ** 2 * (1 / 8);
    const common = { source: PLANE_WAVE, unit: '' };
    const size = (kind.axial === 'Ez' ? 1 : ETA0) / 3;
    rows.push({
      ...common,
      case: `|${kind.axial}| of a wave of 3 V/m over its value, ${degrees} deg, 12 GHz`,
      expected: 1,
      found: magnitude(axial[top] ?? [NaN, NaN]) * size,
      tolerance,
    });
    // k x E / eta0 along x and y where E is out of the plane; -eta0 k x H where H is; in units of the impedance.
    const factor = kind.axial === 'Ez' ? ETA0 : -1 / ETA0;
    for (const [component, share] of [
      [alongX, s],
      [alongY, -c],
    ] as const) {
      const ratio = ratioOf(response(record, 'inside', component), axial)[top] ?? [NaN, NaN];
      rows.push({
        ...common,
        case: `distance of ${component}/${kind.axial} from ${share.toFixed(3)} wave impedances, ${degrees} deg, 12 GHz`,
        expected: 0,
        found: magnitude(subtract(scale(ratio, factor), [share, 0])),
        tolerance,
      });
    }
  }
  return rows;
}

describe('absolute fields', () => {
  for (const kind of SECTIONS) {
    evidence(`a line current makes the field of the Hankel function, in size and phase, ${kind.section}`, () =>
      compareLineCurrent(kind),
    );
    evidence(`a plane wave has the amplitude asked for and the impedance of space, ${kind.section}`, () =>
      comparePlaneWave(kind),
    );
  }
});
