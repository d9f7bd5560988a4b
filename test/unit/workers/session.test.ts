import { describe, expect, test, vi } from 'vitest';
import type { Job } from '../../../src/model/job.ts';
import { parseJob } from '../../../src/model/parse-job.ts';
import type { RunRecord, SessionApi } from '../../../workers/protocol.ts';
import { Run } from '../../../workers/run.ts';
import { runToEnd } from '../../../workers/run-to-end.ts';
import { makeNodeSession } from '../../../workers/session.node.ts';

function job(change: Record<string, unknown> = {}): Job {
  const parsed = parseJob({
    guidewall: 1,
    section: 'E out of plane',
    band: { from: '2 GHz', to: '6 GHz', points: 9, listed: ['3.3 GHz'] },
    sheet: {
      width: '120 mm',
      height: '80 mm',
      edges: { left: 'absorbing', right: 'absorbing', bottom: 'absorbing', top: 'absorbing' },
    },
    grid: { cells: { x: '2 mm', y: '2 mm' } },
    drives: [{ id: 'd', kind: 'line current', at: ['40 mm', '40 mm'], amplitude: '1 A' }],
    probes: [{ id: 'p', at: ['90 mm', '45 mm'] }],
    stop: { decay: '50 dB', after: '20 ns' },
    ...change,
  });
  if (!parsed.ok) throw new Error(parsed.errors[0].message);
  return parsed.value;
}

async function record(session: SessionApi): Promise<RunRecord> {
  const result = await session.record();
  if (!result.ok) throw new Error(result.errors[0].message);
  return result.value;
}

const everything = { view: null, maxWidth: 0, maxHeight: 0, sinceStep: 0 } as const;

describe('a session', () => {
  test('runs until the energy has decayed, and its spectrum is the transform of its trace', async () => {
    const result = await runToEnd(makeNodeSession(), job(), 'main');
    if (!result.ok) throw new Error(result.errors[0].message);
    const run = result.value;
    expect(run.stopReason).toBe('decayed');
    expect(run.energyDb).toBeLessThanOrEqual(-50);
    expect(run.traces[0]!.samples[0]).toHaveLength(run.steps + 1);
    expect([...run.frequenciesHertz].map((f) => f / 1e9)).toEqual([2, 2.5, 3, 3.3, 3.5, 4, 4.5, 5, 5.5, 6]);
    const k = 3;
    const turn = -2 * Math.PI * run.frequenciesHertz[k]! * run.dtSeconds;
    let re = 0;
    let im = 0;
    run.traces[0]!.samples[0].forEach((value, n) => {
      re += value * Math.cos(turn * n) * run.dtSeconds;
      im += value * Math.sin(turn * n) * run.dtSeconds;
    });
    const spectrum = run.spectra[0]!.components[0]!;
    expect(spectrum.re[k]! / re).toBeCloseTo(1, 6);
    expect(spectrum.im[k]! / im).toBeCloseTo(1, 6);
  });

  test('in-plane spectra undo the half-step mean of the trace', async () => {
    const result = await runToEnd(makeNodeSession(), job(), 'main');
    if (!result.ok) throw new Error(result.errors[0].message);
    const run = result.value;
    const k = run.frequenciesHertz.length - 1;
    const turn = -2 * Math.PI * run.frequenciesHertz[k]! * run.dtSeconds;
    let re = 0;
    let im = 0;
    run.traces[0]!.samples[2].forEach((value, n) => {
      re += value * Math.cos(turn * n) * run.dtSeconds;
      im += value * Math.sin(turn * n) * run.dtSeconds;
    });
    // The mean of two half steps is low by cos(pi f dt): an identity of the transform.
    const low = Math.cos(turn / 2);
    const spectrum = run.spectra[0]!.components[2]!;
    expect(Math.hypot(re, im) / Math.hypot(spectrum.re[k]!, spectrum.im[k]!)).toBeCloseTo(low, 5);
  });

  test('held, stepped and resumed it ends with the same samples as a run in one go', async () => {
    const straight = await runToEnd(makeNodeSession(), job(), 'main');
    if (!straight.ok) throw new Error(straight.errors[0].message);
    const session = makeNodeSession();
    await session.open(job(), 'main');
    for (let k = 0; k < 5; k++) await session.stepOnce();
    expect((await session.poll(everything)).progress).toMatchObject({ state: 'held', step: 5 });
    await session.start();
    await new Promise((resolve) => setTimeout(resolve, 2));
    await session.hold();
    await session.start();
    while ((await session.poll(everything)).progress.state !== 'done') await new Promise((resolve) => setTimeout(resolve, 5));
    const broken = await record(session);
    expect(broken.steps).toBe(straight.value.steps);
    expect(broken.traces[0]!.samples[1]).toEqual(straight.value.traces[0]!.samples[1]);
    expect(broken.spectra[0]!.components[0]!.re[3]).toBeCloseTo(straight.value.spectra[0]!.components[0]!.re[3]!, 18);
  });

  test('rewound it starts again from nothing', async () => {
    const session = makeNodeSession();
    await session.open(job(), 'main');
    for (let k = 0; k < 30; k++) await session.stepOnce();
    const first = (await session.poll(everything)).traces[0]!.samples[0];
    await session.rewind();
    expect((await session.poll({ ...everything, sinceStep: 31 })).sinceStep).toBe(0);
    for (let k = 0; k < 30; k++) await session.stepOnce();
    expect((await session.poll(everything)).traces[0]!.samples[0]).toEqual(first);
  });

  test('stops at the time limit, and by hand with what there is', async () => {
    const short = await runToEnd(makeNodeSession(), job({ stop: { decay: 'never', after: '0.5 ns' } }), 'main');
    expect(short.ok && short.value.stopReason).toBe('time limit');
    expect(short.ok && short.value.steps).toBe(Math.ceil(0.5e-9 / (short.ok ? short.value.dtSeconds : 1)));
    const session = makeNodeSession();
    await session.open(job(), 'main');
    for (let k = 0; k < 10; k++) await session.stepOnce();
    await session.stop();
    expect(await record(session)).toMatchObject({ stopReason: 'stopped by the person', steps: 10 });
  });

  test('a field that is no longer finite stops the run with step, place and cause', async () => {
    const wild = job({
      drives: [
        {
          id: 'd',
          kind: 'line current',
          at: ['40 mm', '40 mm'],
          amplitude: '1e30 A',
          waveform: { kind: 'samples', name: 'wild', times: [0, 1e-9], values: [1e9, 1e9] },
        },
      ],
    });
    const result = await runToEnd(makeNodeSession(), wild, 'main');
    expect(result.ok && result.value.stopReason).toBe('not finite');
    expect(result.ok && result.value.trouble).toMatch(/no longer a finite number at step \d+, at .* mm, .* mm .*likely cause/);
  });

  test('an open job gives frames of every view at the asked size', async () => {
    const session = makeNodeSession();
    await session.open(job(), 'main');
    for (let k = 0; k < 60; k++) await session.stepOnce();
    for (const view of ['Ez', 'Hx', 'Hy', '|E|', '|H|'] as const) {
      const { frame } = await session.poll({ ...everything, view, maxWidth: 40, maxHeight: 100 });
      expect(frame).toMatchObject({ view, width: 31, height: 41, step: 60 });
      expect(frame!.peak).toBeGreaterThan(0);
    }
  });
});

test('two threads give the record that one gives, held, stepped and resumed on the way', async () => {
  const fine = job({ grid: { cells: { x: '1 mm', y: '1 mm' } } });
  const one = await runToEnd(makeNodeSession(), fine, 'main');
  const session = makeNodeSession();
  await session.open(fine, 'main', 2);
  await session.start();
  await new Promise((resolve) => setTimeout(resolve, 5));
  await session.hold();
  await session.stepOnce();
  await session.start();
  while ((await session.poll(everything)).progress.state !== 'done') await new Promise((resolve) => setTimeout(resolve, 5));
  const two = await record(session);
  if (!one.ok) throw new Error(one.errors[0].message);
  expect(two.steps).toBe(one.value.steps);
  expect(two.traces).toEqual(one.value.traces);
  expect(two.planHash).toBe(one.value.planHash);
  two.spectra[0]!.components.forEach(({ re, im }, k) => {
    expect([...re]).toEqual([...one.value.spectra[0]!.components[k]!.re]);
    expect([...im]).toEqual([...one.value.spectra[0]!.components[k]!.im]);
  });
});

test('a kernel that breaks ends the run and says so', async () => {
  const advance = vi.spyOn(Run.prototype, 'advance').mockImplementation(() => {
    throw new Error('unreachable');
  });
  const result = await runToEnd(makeNodeSession(), job(), 'main');
  advance.mockRestore();
  if (!result.ok) throw new Error(result.errors[0].message);
  expect(result.value.stopReason).toBe('broken');
  expect(result.value.trouble).toContain('unreachable');
});
