import fc from 'fast-check';
import { describe, expect, it, vi } from 'vitest';
import { applyCommand, findAddedIds } from '../../src/model/commands.ts';
import type { Command } from '../../src/model/commands.ts';
import { describeCommand } from '../../src/model/describe-command.ts';
import { DEEPEST_HISTORY, makeHistory, recordEdit, redoEdit, undoEdit } from '../../src/model/history.ts';
import type { HistoryPolicy } from '../../src/model/history.ts';
import type { Job } from '../../src/model/job.ts';
import { makeEmptyJob, makeLineCurrent, makePart, makeProbe } from '../../src/model/new-job.ts';
import { parseJob } from '../../src/model/parse-job.ts';
import { serialiseJob } from '../../src/model/serialise-job.ts';

// Hundreds of cases each; a busy machine may need longer than a plain test may take.
vi.setConfig({ testTimeout: 60_000 });

/** A command that may or may not fit the job it meets: indices wrap onto the things that are there. */
type Move = (job: Job) => Command;

function pickIds(job: Job, picks: readonly number[]): string[] {
  const all = [...job.parts, ...job.drives, ...job.probes, ...job.materials].map((thing) => thing.id);
  return [...new Set(picks.flatMap((pick) => all[pick % Math.max(1, all.length)] ?? []))];
}

const mm = fc.integer({ min: -5, max: 95 }).map((value) => `${value} mm`);
const size = fc.integer({ min: -1, max: 40 }).map((value) => `${value} mm`);
const picks = fc.array(fc.nat(30), { minLength: 1, maxLength: 4 });
const metres = fc.integer({ min: -20, max: 20 }).map((value) => value / 1000);

const moves: fc.Arbitrary<Move> = fc.oneof(
  fc.tuple(mm, mm, size).map(([x, y, radius]): Move => (job) => ({
    do: 'add',
    list: 'parts',
    item: makePart(job, 'disc', 'ptfe', { centre: [x, y], radius }),
  })),
  fc.tuple(mm, mm, mm, size).map(([x, y, z, thickness]): Move => (job) => ({
    do: 'add',
    list: 'parts',
    item: makePart(job, 'wall', 'copper', {
      points: [
        [x, y],
        [z, 'a + 1 mm'],
      ],
      thickness,
    }),
    at: 0,
  })),
  fc.tuple(mm, mm).map(([x, y]): Move => (job) => ({ do: 'add', list: 'probes', item: makeProbe(job, [x, y]) })),
  fc.tuple(mm, mm).map(([x, y]): Move => (job) => ({ do: 'add', list: 'drives', item: makeLineCurrent(job, [x, y]) })),
  picks.map((chosen): Move => (job) => ({ do: 'remove', ids: pickIds(job, chosen) })),
  fc
    .tuple(picks, metres, metres)
    .map(([chosen, dxMetres, dyMetres]): Move => (job) => ({ do: 'move', ids: pickIds(job, chosen), dxMetres, dyMetres })),
  fc
    .tuple(picks, metres)
    .map(([chosen, dxMetres]): Move => (job) => ({ do: 'duplicate', ids: pickIds(job, chosen), dxMetres, dyMetres: 0 })),
  fc.tuple(fc.nat(9), fc.nat(9)).map(([pick, to]): Move => (job) => ({
    do: 'reorder',
    id: job.parts[pick % Math.max(1, job.parts.length)]?.id ?? 'none',
    to,
  })),
  fc
    .tuple(fc.constantFrom('a', 'b', 'pi'), fc.oneof(mm, fc.constantFrom('a/2', 'b + 1 mm', 'no')))
    .map(([name, value]): Move => () => ({ do: 'name value', name, value })),
  fc.constantFrom('a', 'b').map((name): Move => () => ({ do: 'unname value', name })),
  fc
    .constantFrom<Job['section']>('E out of plane', 'H out of plane')
    .map((section): Move => () => ({ do: 'set section', section })),
  fc
    .tuple(fc.constantFrom('title', 'section', 'nothing', '__proto__'), fc.oneof(fc.string(), fc.anything()))
    .map(([key, value]): Move => () => ({ do: 'set', path: [key], value })),
  fc
    .tuple(fc.constantFrom('left', 'right', 'top'), fc.constantFrom('repeating', 'metal', 'absorbing', 'none'))
    .map(([edge, value]): Move => () => ({ do: 'set', path: ['sheet', 'edges', edge], value })),
);

const policies: fc.Arbitrary<HistoryPolicy> = fc.oneof(
  fc.constant<HistoryPolicy>({ kind: 'record' }),
  fc.constantFrom('drag 1', 'drag 2').map((key): HistoryPolicy => ({ kind: 'join', key })),
);

function start(): Job {
  return { ...makeEmptyJob(), values: { a: '10 mm' } };
}

describe('commands', () => {
  it('leave a job that is valid, has unique ids and reads back from its own text, whatever the sequence', () => {
    fc.assert(
      fc.property(fc.array(moves, { maxLength: 25 }), (sequence) => {
        let job = start();
        for (const move of sequence) {
          const text = JSON.stringify(job);
          const result = applyCommand(job, move(job));
          expect(JSON.stringify(job)).toBe(text);
          if (result.ok) job = result.value;
          else expect(result.errors[0].hint).toBeTruthy();
        }
        const ids = [...job.parts, ...job.drives, ...job.probes, ...job.materials].map((thing) => thing.id);
        expect(new Set(ids).size).toBe(ids.length);
        expect(parseJob(serialiseJob(job))).toEqual({ ok: true, value: job });
      }),
      { numRuns: 60 },
    );
  });

  it('can all be undone to the very job they started from, and redone to the very job they ended with', () => {
    fc.assert(
      fc.property(fc.array(fc.tuple(moves, policies), { maxLength: 25 }), (sequence) => {
        const first = start();
        let job = first;
        let history = makeHistory();
        for (const [move, policy] of sequence) {
          const command = move(job);
          const result = applyCommand(job, command);
          if (!result.ok) continue;
          history = recordEdit(history, job, describeCommand(job, command), policy);
          job = result.value;
        }
        const last = job;
        for (let step = undoEdit(history, job); step !== null; step = undoEdit(history, job)) ({ history, job } = step);
        expect(job).toBe(first);
        for (let step = redoEdit(history, job); step !== null; step = redoEdit(history, job)) ({ history, job } = step);
        expect(job).toBe(last);
      }),
      { numRuns: 60 },
    );
  });

  it('keep at most two hundred steps', () => {
    const job = start();
    let history = makeHistory();
    for (let k = 0; k < DEEPEST_HISTORY + 50; k += 1) history = recordEdit(history, job, `edit ${k}`, { kind: 'record' });
    expect(history.past.length).toBe(DEEPEST_HISTORY);
    expect(history.past.at(-1)?.label).toBe('edit 249');
  });

  it('tell which things a duplication added', () => {
    const job = start();
    const added = applyCommand(job, { do: 'duplicate', ids: ['plane-wave-1'], dxMetres: 0, dyMetres: 0 });
    expect(added.ok && findAddedIds(job, added.value)).toEqual(['plane-wave-2']);
  });
});
