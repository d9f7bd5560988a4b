import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { writeDouble, writeHeadLine, writeName, writeSingle } from '../../../src/model/exports/csv.ts';
import type { ExportedRun } from '../../../src/model/exports/run-data.ts';
import { makeSpectrumCsv } from '../../../src/model/exports/spectrum-csv.ts';
import { makeTimeSeriesCsv } from '../../../src/model/exports/time-series-csv.ts';
import { hashJob } from '../../../src/model/job-hash.ts';
import { makeEmptyJob, makeProbe } from '../../../src/model/new-job.ts';
import type { RunRecord } from '../../../workers/protocol.ts';

const empty = makeEmptyJob();
const job = {
  ...empty,
  title: 'Slot, 3 mm; =SUM(A1)',
  probes: [
    { ...makeProbe(empty, ['90 mm', '45 mm']), name: '=HYPERLINK("x")' },
    { ...makeProbe(empty, ['90 mm', '45 mm']), id: 'probe-2', name: 'Behind, left' },
  ],
};

const run: ExportedRun = {
  components: ['Ez', 'Hx', 'Hy'],
  dtSeconds: 1e-12,
  steps: 3,
  stopReason: 'decayed',
  energyDb: -60.123,
  estimate: { cellsX: 180, cellsY: 90, dxMetres: 0.001, dyMetres: 0.001 },
  frequenciesHertz: [1e9, 2.5e9],
  traces: job.probes.map(({ id }) => ({
    probeId: id,
    samples: [Float32Array.of(0, 0.1, -1e-20), Float32Array.of(1, 2, 3), Float32Array.of(0, -0, 1 / 3)],
  })),
  spectra: job.probes.map(({ id }) => ({
    probeId: id,
    components: [0, 1, 2].map((k) => ({ re: [1 + k, 2], im: [-0.5, 1e-13] })),
  })),
};

/** A small reader of RFC 4180 for the tests: quoted fields, CRLF. */
function readCsv(text: string): string[][] {
  const rows: string[][] = [];
  for (const line of text.split('\r\n').slice(0, -1)) {
    const cells: string[] = [];
    let rest = `,${line}`;
    while (rest !== '') {
      const cell = /^,(?:"((?:[^"]|"")*)"|([^,"]*))/.exec(rest);
      if (cell === null) throw new Error(`Not RFC 4180: ${line}`);
      cells.push(cell[1]?.replaceAll('""', '"') ?? cell[2] ?? '');
      rest = rest.slice(cell[0].length);
    }
    rows.push(cells);
  }
  return rows;
}

describe('numbers', () => {
  it('of single precision read back to the last bit from at most nine digits', () => {
    fc.assert(
      fc.property(fc.float({ noNaN: true, noDefaultInfinity: true }), (value) => {
        const text = writeSingle(value);
        expect(Math.fround(Number(text))).toBe(value === 0 ? 0 : value);
        const digits = text.replace(/e.*/, '').replaceAll(/[-.]/g, '').replace(/^0+/, '').replace(/0+$/, '');
        expect(digits.length).toBeLessThanOrEqual(9);
        expect(text).not.toContain(',');
      }),
      { numRuns: 1000 },
    );
    expect(writeSingle(Math.fround(0.1))).toBe('0.1');
  });

  it('of double precision read back to the last bit', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        expect(Number(writeDouble(value))).toBe(value === 0 ? 0 : value);
      }),
    );
  });

  it('that are not finite leave the cell empty', () => {
    expect([writeDouble(-Infinity), writeDouble(Number.NaN), writeSingle(Infinity)]).toEqual(['', '', '']);
  });
});

describe('names', () => {
  it.each(['=1+1', '+1', '-1', '@x', '\t=1', '\r=1', '  =1', '\n@x'])('%j is no formula', (name) => {
    expect(writeName(name)).toMatch(/^'/);
  });

  it('never start a formula or break a row, whatever they are', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 30 }), (name) => {
        const cell = writeName(name);
        expect(cell).not.toMatch(/^"?\s*[=+\-@\t\r]/);
        expect(cell).not.toMatch(/[\r\n;]/);
        expect(readCsv(`${cell},1\r\n`)[0]).toHaveLength(2);
        expect(writeHeadLine('job', name)).not.toMatch(/[,;"\t\r\n]/);
      }),
    );
  });
});

describe('the time series file', () => {
  const text = makeTimeSeriesCsv(job, run, '0.1.0');
  const rows = readCsv(text);
  const table = rows.filter(([cell]) => !cell?.startsWith('#'));

  it('has a head that says what it is, in single cells', () => {
    const head = rows.filter(([cell]) => cell?.startsWith('#'));
    expect(head.every((row) => row.length === 1)).toBe(true);
    const all = head.flat().join('\n');
    for (const words of [
      'Guidewall 0.1.0',
      `sha256 ${hashJob(job)}`,
      'E out of plane',
      'exp(+jwt) and peak values',
      '180 by 90 cells of 1 mm by 1 mm',
      '1e-12 s',
      'ended after 3 steps: decayed with the energy at -60.12 dB of its peak',
    ]) {
      expect(all).toContain(words);
    }
  });

  it('has a column for the time and for every probe and component', () => {
    expect(table[0]).toEqual([
      't (s)',
      `'=HYPERLINK("x") Ez (V/m)`,
      `'=HYPERLINK("x") Hx (A/m)`,
      `'=HYPERLINK("x") Hy (A/m)`,
      'Behind, left Ez (V/m)',
      'Behind, left Hx (A/m)',
      'Behind, left Hy (A/m)',
    ]);
  });

  it('has a row for every step with the very samples', () => {
    expect(table.slice(1)).toEqual([
      ['0', '0', '1', '0', '0', '1', '0'],
      ['1e-12', '0.1', '2', '0', '0.1', '2', '0'],
      ['2e-12', '-1e-20', '3', '0.33333334', '-1e-20', '3', '0.33333334'],
    ]);
  });

  it('ends every line with CRLF', () => {
    expect(text.replaceAll('\r\n', '')).not.toMatch(/[\r\n]/);
    expect(text.endsWith('\r\n')).toBe(true);
  });
});

describe('the spectrum file', () => {
  const insertion = job.probes.map(({ id }) => ({
    probeId: id,
    components: [0, 1, 2].map(() => ({ re: [0.1, 0], im: [0, 0], belowFloor: [false, true] })),
  }));
  const table = readCsv(makeSpectrumCsv(job, { main: run, reference: run, insertion }, '0.1.0')).filter(
    ([cell]) => !cell?.startsWith('#'),
  );

  it('gives run, reference and H side by side', () => {
    expect(table[0]?.slice(9, 17).map((head) => head.replace(`'=HYPERLINK("x") `, ''))).toEqual([
      'Hx re (A/m/Hz)',
      'Hx im (A/m/Hz)',
      'Hx reference re (A/m/Hz)',
      'Hx reference im (A/m/Hz)',
      'Hx H re',
      'Hx H im',
      'Hx H (dB)',
      'Hx H below floor',
    ]);
    expect(table[1]?.slice(9, 17)).toEqual(['2', '-0.5', '2', '-0.5', '0.1', '0', '-20', '0']);
    expect(table[2]?.slice(9, 17)).toEqual(['2', '1e-13', '2', '1e-13', '0', '0', '', '1']);
    expect(table.map(([frequency]) => frequency)).toEqual(['f (Hz)', '1000000000', '2500000000']);
  });

  it('without a reference run has the run alone', () => {
    const rows = readCsv(makeSpectrumCsv(job, { main: run, reference: null, insertion: null }, '0.1.0'));
    expect(rows.at(-1)).toHaveLength(1 + 2 * 3 * 2);
    expect(rows.flat()).toContain('# reference run: none');
  });

  it('tells probes of one name apart', () => {
    const twins = { ...job, probes: job.probes.map((probe) => ({ ...probe, name: 'Twin' })) };
    const head = readCsv(makeSpectrumCsv(twins, { main: run, reference: null, insertion: null }, '0.1.0')).find(
      ([cell]) => cell === 'f (Hz)',
    );
    expect(new Set(head).size).toBe(head?.length);
  });
});

describe('a run record', () => {
  it('fits what the exports take', () => {
    const asExported = (record: RunRecord): ExportedRun => record;
    expect(asExported).toBeTypeOf('function');
  });
});

describe('the hash of a job', () => {
  it('is the same whatever the order of keys, and another for another job', () => {
    const turned = Object.fromEntries(Object.entries(job).toReversed()) as unknown as typeof job;
    expect(hashJob(turned)).toBe(hashJob(job));
    expect(hashJob({ ...job, title: 'Other' })).not.toBe(hashJob(job));
    expect(hashJob(job)).toMatch(/^[0-9a-f]{64}$/);
  });
});
