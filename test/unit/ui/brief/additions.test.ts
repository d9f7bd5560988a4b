import { beforeEach, expect, test } from 'vitest';
import { useJobStore } from '../../../../src/app/job-store.ts';
import { useNoticeStore } from '../../../../src/app/notice-store.ts';
import { useViewStore } from '../../../../src/app/view-store.ts';
import { addDrive, addPart, addProbe, duplicate, remove } from '../../../../src/ui/brief/additions.ts';
import type { PartKind } from '../../../../src/model/job.ts';
import { makeSmallJob } from '../../app/small-job.ts';

const job = () => useJobStore.getState().job;

beforeEach(() => {
  useJobStore.getState().dispatch({ do: 'replace', job: makeSmallJob() }, { kind: 'skip' });
  useNoticeStore.setState({ notices: [] });
});

test.each<PartKind>(['wall', 'rectangle', 'disc', 'ring', 'polygon', 'stroke'])(
  'a %s added without a pointer stands in the middle of the sheet, selected, and can be run',
  (kind) => {
    addPart(kind);
    const part = job().parts.at(-1);
    expect(part?.kind).toBe(kind);
    expect(useViewStore.getState().selection).toEqual([part?.id]);
    const { resolved } = useJobStore.getState();
    const points = resolved.ok ? (resolved.value.parts.at(-1)?.outline.flat() ?? []) : expect.fail('not resolved');
    expect(points.length).toBeGreaterThan(2);
    expect(points.every(([x, y]) => x > 0.06 && x < 0.12 && y > 0.02 && y < 0.07)).toBe(true);
  },
);

test('probes and drives are added with names of their own', () => {
  addProbe();
  addDrive('line current');
  expect(job().probes.map((probe) => probe.name)).toEqual(['Probe 1', 'Probe 2']);
  expect(job().drives.at(-1)?.kind).toBe('line current');
});

test('a copy stands aside of its original and is selected', () => {
  duplicate(['probe-1']);
  const copy = job().probes.at(-1);
  expect(copy?.at).not.toEqual(job().probes[0]?.at);
  expect(useViewStore.getState().selection).toEqual([copy?.id]);
});

test('what was removed is put back where it stood, also after other edits', () => {
  remove(['wall-1'], 'Wall A');
  useJobStore.getState().dispatch({ do: 'set', path: ['title'], value: 'Edited since' });
  useNoticeStore.getState().notices[0]?.action?.run();
  expect(job().parts.map((part) => part.id)).toEqual(['wall-1', 'board']);
  expect(job().title).toBe('Edited since');
});

test('a material in use says why it stays', () => {
  useJobStore.getState().dispatch({
    do: 'add',
    list: 'materials',
    item: { id: 'foam', name: 'Foam', permittivity: 1.1, permeability: 1, conductivity: 0, magneticLoss: 0 },
  });
  useJobStore.getState().dispatch({ do: 'set', path: ['parts', 1, 'material'], value: 'foam' });
  remove(['foam'], 'Foam');
  expect(job().materials).toHaveLength(1);
  expect(useNoticeStore.getState().notices[0]?.errors).toHaveLength(1);
});
