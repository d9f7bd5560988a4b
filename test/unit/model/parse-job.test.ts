import { describe, expect, it } from 'vitest';
import type { AppError } from '../../../src/base/result.ts';
import type { Job } from '../../../src/model/job.ts';
import { MIGRATIONS, migrateJob } from '../../../src/model/migrations.ts';
import { makeEmptyJob } from '../../../src/model/new-job.ts';
import { parseJob } from '../../../src/model/parse-job.ts';
import { serialiseJob } from '../../../src/model/serialise-job.ts';
import { makeFullJob } from '../../fixtures/full-job.ts';

const SHORT = {
  guidewall: 1,
  section: 'E out of plane',
  band: { from: '1 GHz', to: '3 GHz' },
  sheet: { width: '0.3 m', height: '100 mm' },
};

function accept(input: unknown): Job {
  const result = parseJob(input);
  if (!result.ok) throw new Error(JSON.stringify(result.errors));
  return result.value;
}

function refuse(input: unknown): readonly AppError[] {
  const result = parseJob(input);
  if (result.ok) throw new Error('The job was accepted.');
  return result.errors;
}

describe('a short job', () => {
  it('needs its version, section, band and sheet, and gets the rest', () => {
    const job = accept(SHORT);
    expect(job.title).toBe('Untitled');
    expect(job.band).toEqual({ from: '1 GHz', to: '3 GHz', points: 201, listed: [] });
    expect(job.sheet.background).toBe('air');
    expect(job.sheet.edges).toEqual({ left: 'absorbing', right: 'absorbing', bottom: 'absorbing', top: 'absorbing' });
    expect(job.grid).toEqual({ cells: { perWavelength: 20 }, absorberCells: 12, courant: 0.99 });
    // A hundred periods of 1 GHz outlast thirty crossings of 0.32 m.
    expect(job.stop).toEqual({ decay: '60 dB', after: '100 ns' });
  });

  it('names and numbers its things', () => {
    const disc = { kind: 'disc', centre: ['10 mm', '10 mm'], radius: '1 mm' };
    const at = ['20 mm', '20 mm'];
    const job = accept({
      ...SHORT,
      section: 'H out of plane',
      parts: [disc, { ...disc, name: 'Post', id: 'disc-1' }, disc],
      drives: [{ kind: 'line current', at }],
      probes: [{ at }, { at }],
    });
    expect(job.parts.map(({ id, name }) => [id, name])).toEqual([
      ['disc-2', 'Disc A'],
      ['disc-1', 'Post'],
      ['disc-3', 'Disc B'],
    ]);
    expect(job.parts[0]?.material).toBe('perfect-metal');
    expect(job.probes.map(({ id, name }) => [id, name])).toEqual([
      ['probe-1', 'Probe 1'],
      ['probe-2', 'Probe 2'],
    ]);
    expect(job.drives[0]?.amplitude).toBe('1 V');
  });

  it('may name the schema for the editor', () => {
    expect(accept({ $schema: './job.schema.json', ...SHORT })).toEqual(accept(SHORT));
  });

  it.each(['guidewall', 'section', 'band', 'sheet'] as const)('without %s is refused by that path', (key) => {
    const errors = refuse({ ...SHORT, [key]: undefined });
    expect(errors[0]?.path).toBe(key);
  });
});

describe('a whole job', () => {
  it('comes through unchanged, as data and as text', () => {
    expect(accept(makeFullJob())).toEqual(makeFullJob());
    expect(accept(serialiseJob(makeFullJob()))).toEqual(makeFullJob());
    expect(accept(`\uFEFF${serialiseJob(makeEmptyJob())}`)).toEqual(makeEmptyJob());
  });

  it('is written the same whatever the order of its keys, its named values in their own order', () => {
    const job = makeFullJob();
    const turned = Object.fromEntries(Object.entries(job).toReversed());
    expect(serialiseJob(accept(turned))).toBe(serialiseJob(job));
    const text = serialiseJob({ ...job, values: { z: '1 mm', top: '6 GHz', a: 'z', gap: 'z' } });
    expect(text.indexOf('"z":')).toBeLessThan(text.indexOf('"top":', text.indexOf('"values"')));
    expect(text.indexOf('"top":', text.indexOf('"values"'))).toBeLessThan(text.indexOf('"a":'));
  });
});

describe('errors give path, value and mend', () => {
  const wall = {
    kind: 'wall',
    points: [
      ['1 mm', '1 mm'],
      ['9 mm', '1 mm'],
    ],
    thickness: '1 mm',
  };
  const cases: [string, unknown, Partial<AppError>][] = [
    ['an unknown key', { ...SHORT, secton: 1 }, { path: 'secton', hint: 'Did you mean "section"?' }],
    [
      'an unknown key inside',
      { ...SHORT, parts: [{ ...wall, thicknes: '1 mm' }] },
      { path: 'parts[0].thicknes', hint: 'Did you mean "thickness"?' },
    ],
    [
      'an unknown kind',
      { ...SHORT, parts: [{ ...wall, kind: 'rectange' }] },
      { path: 'parts[0].kind', message: '"rectange" is not known here.' },
    ],
    [
      'a bare number',
      { ...SHORT, parts: [{ ...wall, thickness: 3 }] },
      { path: 'parts[0].thickness', hint: 'Write it like "22.86 mm".' },
    ],
    ['a decimal comma', { ...SHORT, parts: [{ ...wall, thickness: '1,5 mm' }] }, { path: 'parts[0].thickness' }],
    [
      'a negative size',
      { ...SHORT, parts: [{ ...wall, thickness: '-1 mm' }] },
      { path: 'parts[0].thickness', message: '"-1 mm" is not above zero.' },
    ],
    [
      'a wrong unit',
      { ...SHORT, band: { from: '1 mm', to: '3 GHz' } },
      { path: 'band.from', message: '"1 mm" is a length; a frequency is wanted.' },
    ],
    ['a size beyond reason', { ...SHORT, sheet: { width: '9e9 m', height: '1 m' } }, { path: 'sheet.width' }],
    ['an unknown name', { ...SHORT, probes: [{ at: ['gap', '1 mm'] }] }, { path: 'probes[0].at[0]' }],
    ['a point of three', { ...SHORT, probes: [{ at: ['1 mm', '1 mm', '1 mm'] }] }, { path: 'probes[0].at' }],
    [
      'a lone point',
      { ...SHORT, parts: [{ ...wall, points: [['1 mm', '1 mm']] }] },
      { path: 'parts[0].points', hint: 'Give at least two.' },
    ],
    [
      'an unknown material',
      { ...SHORT, parts: [{ ...wall, material: 'aluminum' }] },
      { path: 'parts[0].material', hint: 'Did you mean "aluminium"?' },
    ],
    [
      'an unknown filling',
      { ...SHORT, sheet: { ...SHORT.sheet, background: 'aire' } },
      { path: 'sheet.background', hint: 'Did you mean "air"?' },
    ],
    [
      'too few cells',
      { ...SHORT, grid: { cells: { perWavelength: 3 } } },
      { path: 'grid.cells.perWavelength', message: '3 is out of range.' },
    ],
    ['too thin an absorber', { ...SHORT, grid: { absorberCells: 3 } }, { path: 'grid.absorberCells' }],
    ['too thick an absorber', { ...SHORT, grid: { absorberCells: 65 } }, { path: 'grid.absorberCells' }],
    ['too long a step', { ...SHORT, grid: { courant: 1 } }, { path: 'grid.courant' }],
    ['a permittivity below 1', { ...SHORT, materials: [{ id: 'm', permittivity: 0.5 }] }, { path: 'materials[0].permittivity' }],
    [
      'a permeability below 1',
      { ...SHORT, materials: [{ id: 'm', permittivity: 1, permeability: 0 }] },
      { path: 'materials[0].permeability' },
    ],
    [
      'a negative loss',
      { ...SHORT, materials: [{ id: 'm', permittivity: 1, conductivity: -1 }] },
      { path: 'materials[0].conductivity' },
    ],
    ['a library id', { ...SHORT, materials: [{ id: 'ptfe', permittivity: 2 }] }, { path: 'materials[0].id' }],
    [
      'a repeated id',
      {
        ...SHORT,
        probes: [
          { id: 'a', at: ['0', '0'] },
          { id: 'a', at: ['0', '0'] },
        ],
      },
      { path: 'probes[1].id', message: 'The id "a" is taken by probes[0].' },
    ],
    [
      'an id across lists',
      { ...SHORT, parts: [{ ...wall, id: 'a' }], probes: [{ id: 'a', at: ['0', '0'] }] },
      { path: 'probes[0].id' },
    ],
    [
      'a lone repeating edge',
      { ...SHORT, sheet: { ...SHORT.sheet, edges: { left: 'repeating' } } },
      { path: 'sheet.edges.right' },
    ],
    ['a name of the grammar', { ...SHORT, values: { pi: '3 mm' } }, { path: 'values.pi' }],
    ['a circle of names', { ...SHORT, values: { a: 'b', b: 'a' } }, { path: 'values.a', code: 'cycle' }],
    ['a line break in a name', { ...SHORT, title: 'a\nb' }, { path: 'title' }],
    ['a name too long', { ...SHORT, title: 'x'.repeat(201) }, { path: 'title' }],
    [
      'times that fall',
      { ...SHORT, drives: [{ kind: 'plane wave', waveform: { kind: 'samples', times: [0, 2, 1], values: [0, 0, 0] } }] },
      { path: 'drives[0].waveform.times[2]' },
    ],
    [
      'a time without a value',
      { ...SHORT, drives: [{ kind: 'plane wave', waveform: { kind: 'samples', times: [0, 1], values: [0, 0, 0] } }] },
      { path: 'drives[0].waveform.values' },
    ],
    [
      'a current in volts',
      { ...SHORT, drives: [{ kind: 'line current', at: ['0', '0'], amplitude: '1 V' }] },
      { path: 'drives[0].amplitude' },
    ],
    ['a version from the future', { ...SHORT, guidewall: 2 }, { path: 'guidewall', code: 'too new' }],
    ['a version that is none', { ...SHORT, guidewall: '1' }, { path: 'guidewall', code: 'form' }],
    ['a document of another kind', { hello: 1 }, { code: 'not a job' }],
    ['a list', [], { code: 'not a job' }],
    ['a text cut short', '{"guidewall": 1', { code: 'not json' }],
    ['a key that reaches the prototype', '{"guidewall": 1, "values": {"__proto__": "1 mm"}}', { path: 'values.__proto__' }],
    ['a key called constructor', { ...SHORT, values: { constructor: '1 mm' } }, { path: 'values.constructor' }],
  ];
  it.each(cases)('%s', (_what, input, expected) => {
    const [error] = refuse(input);
    expect(error).toMatchObject(expected);
    expect(error?.hint).toBeTruthy();
  });

  it('all at once, up to twenty', () => {
    const probes = Array.from({ length: 30 }, () => ({ at: ['1', '1'] }));
    expect(refuse({ ...SHORT, probes }).length).toBe(20);
  });

  it('with long values shortened', () => {
    const [error] = refuse({ ...SHORT, section: 'x'.repeat(5000) });
    expect(error?.message.length).toBeLessThan(120);
  });
});

describe('limits', () => {
  const at = ['1 mm', '1 mm'];
  const disc = { kind: 'disc', centre: at, radius: '1 mm' };
  const many = (count: number, item: unknown): unknown[] => Array.from({ length: count }, () => item);

  it.each([
    ['parts', 2000, disc],
    ['probes', 256, { at }],
    ['drives', 16, { kind: 'line current', at }],
  ])('%s: at most %s', (list, most, item) => {
    expect(parseJob({ ...SHORT, [list]: many(most, item) }).ok).toBe(true);
    expect(refuse({ ...SHORT, [list]: many(most + 1, item) })[0]).toMatchObject({ path: list });
  });

  it('points of a part: at most 10000', () => {
    const stroke = (count: number) => ({ ...SHORT, parts: [{ kind: 'stroke', points: many(count, at), width: '1 mm' }] });
    expect(parseJob(stroke(10_000)).ok).toBe(true);
    expect(refuse(stroke(10_001))[0]).toMatchObject({ path: 'parts[0].points' });
  });

  it('text: at most twenty million characters', () => {
    expect(refuse(' '.repeat(20_000_001))[0]).toMatchObject({ code: 'too large' });
  });
});

describe('migrations', () => {
  it('are numbered without a gap', () => {
    expect(MIGRATIONS.map((step) => step.from)).toEqual(MIGRATIONS.map((_, k) => k));
  });

  it('turn the band of a draft into an object', () => {
    const before = { guidewall: 0, section: 'E out of plane', band: ['1 GHz', '3 GHz'], frequencyPoints: 51, sheet: SHORT.sheet };
    const after = {
      guidewall: 1,
      section: 'E out of plane',
      band: { from: '1 GHz', to: '3 GHz', points: 51 },
      sheet: SHORT.sheet,
    };
    expect(migrateJob(before, 0)).toEqual(after);
    expect(accept(before)).toEqual(accept(after));
  });

  it('leave a document of the current version alone', () => {
    expect(migrateJob(SHORT, 1)).toBe(SHORT);
  });
});
