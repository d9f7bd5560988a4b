import { describe, expect, it } from 'vitest';
import type { Job, ResolvedJob } from '../../../src/model/job.ts';
import { makeEmptyJob, makePart, makeProbe } from '../../../src/model/new-job.ts';
import { resolveJob } from '../../../src/model/resolve-job.ts';
import { makeFullJob } from '../../fixtures/full-job.ts';

function resolve(job: Job): ResolvedJob {
  const result = resolveJob(job);
  if (!result.ok) throw new Error(JSON.stringify(result.errors));
  return result.value;
}

function firstFault(job: Job) {
  const result = resolveJob(job);
  if (result.ok) throw new Error('The job resolved.');
  return result.errors[0];
}

describe('a resolved job', () => {
  it('holds SI numbers of everything written with units', () => {
    const resolved = resolve(makeFullJob());
    expect(resolved.band).toEqual({ fromHertz: 1e9, toHertz: 6e9, points: 11, listedHertz: [2.45e9] });
    expect(resolved.sheet.widthMetres).toBe(0.18);
    expect(resolved.sheet.heightMetres).toBeCloseTo(0.09144, 12);
    expect(resolved.sheet.originMetres).toEqual([0.02, 0]);
    expect(resolved.grid).toEqual({ cells: { xMetres: 0.001, yMetres: 0.001 }, absorberCells: 10, courant: 0.9 });
    expect(resolved.stop).toEqual({ decayDb: 60, afterSeconds: 4e-8 });
    expect(resolved.drives.map(({ waveform }) => waveform)).toEqual([
      { kind: 'band pulse' },
      { kind: 'continuous wave', frequencyHertz: 2.45e9 },
      { kind: 'damped step', riseSeconds: 1e-10, decaySeconds: 2e-9 },
      { kind: 'samples', times: [0, 1e-10, 3e-10], values: [0, 1, 0] },
    ]);
    expect(resolved.drives[1]?.amplitude).toBe(0.02);
    expect(resolved.probes[1]?.at[0]).toBe(-0.01);
    expect(resolved.parts.map((part) => part.medium.metal)).toEqual([true, false, false, false, false, false]);
  });

  it('takes "never" as a decay that does not come', () => {
    const job = makeEmptyJob();
    expect(resolve({ ...job, stop: { ...job.stop, decay: 'never' } }).stop.decayDb).toBe(Infinity);
  });

  it('keeps the outlines of parts an edit left alone', () => {
    const job = makeFullJob();
    const before = resolve(job);
    const after = resolve({ ...job, title: 'Other' });
    expect(after.parts[4]?.outline).toBe(before.parts[4]?.outline);
  });
});

describe('what does not fit together is said by path', () => {
  const job = makeEmptyJob();
  it('a band the wrong way round', () => {
    expect(firstFault({ ...job, band: { ...job.band, from: '7 GHz' } })).toMatchObject({ path: 'band.to', code: 'band' });
  });

  it('a probe outside the sheet, with where the sheet is', () => {
    const fault = firstFault({ ...job, probes: [{ ...makeProbe(job, ['200 mm', '1 mm']) }] });
    expect(fault.path).toBe('probes[0].at');
    expect(fault.message).toContain('(200 mm, 1 mm), outside the sheet');
    expect(fault.hint).toContain('0 mm to 180 mm in x');
  });

  it('a probe on the sheet only by the moved origin', () => {
    const probes = [makeProbe(job, ['-10 mm', '0 mm'])];
    expect(firstFault({ ...job, probes }).path).toBe('probes[0].at');
    expect(resolveJob({ ...job, probes, sheet: { ...job.sheet, origin: ['90 mm', '45 mm'] } }).ok).toBe(true);
  });

  it('a probe on the very edge stands on the sheet', () => {
    expect(resolveJob({ ...job, probes: [makeProbe(job, ['180 mm', '90 mm'])] }).ok).toBe(true);
  });

  it('a ring whose inner radius is the larger', () => {
    const ring = makePart(job, 'ring', 'copper', {
      centre: ['50 mm', '50 mm'],
      inner: '9 mm',
      outer: '5 mm',
      from: '0 deg',
      to: '90 deg',
    });
    expect(firstFault({ ...job, parts: [ring] })).toMatchObject({ path: 'parts[0].inner' });
  });

  it('a rectangle without area', () => {
    const flat = makePart(job, 'rectangle', 'copper', { from: ['1 mm', '1 mm'], to: ['1 mm', '5 mm'] });
    expect(firstFault({ ...job, parts: [flat] })).toMatchObject({ path: 'parts[0]', code: 'shape' });
  });

  it('a tangle of thousands of crossings', () => {
    const points = Array.from({ length: 200 }, (_, k): [string, string] => [`${(k * 61) % 101} mm`, `${(k * 37) % 89} mm`]);
    const fault = firstFault({ ...job, parts: [makePart(job, 'stroke', 'copper', { points, width: '1 mm' })] });
    expect(fault).toMatchObject({ path: 'parts[0].points', code: 'shape' });
  });

  it('a sheet filled with metal', () => {
    expect(firstFault({ ...job, sheet: { ...job.sheet, background: 'copper' } })).toMatchObject({ path: 'sheet.background' });
  });
});
