import { describe, expect, it } from 'vitest';
import type { Part, PartKind } from '../../../src/model/job.ts';
import { outlineArea } from '../../../src/model/outline.ts';
import { makeNumberReader } from '../../../src/model/number-reader.ts';
import { makeEmptyJob, makePart } from '../../../src/model/new-job.ts';
import {
  describePart,
  dragHandle,
  listDimensions,
  listHandles,
  movePart,
  PART_KINDS,
  rulesOf,
  setDimension,
} from '../../../src/model/parts/registry.ts';
import { makeFullJob } from '../../fixtures/full-job.ts';

const job = makeEmptyJob();
const values = { a: '20 mm' };
const full = makeFullJob();

function area(part: Part): number {
  const drawn = rulesOf(part).draw(part, makeNumberReader({ ...full.values, ...values }), 'parts[0].');
  if (!drawn.ok) throw new Error(JSON.stringify(drawn.errors));
  return outlineArea(drawn.value.outline);
}

const kinds = Object.keys(PART_KINDS) as PartKind[];
const partOf = (kind: PartKind): Part => {
  const part = full.parts.find((candidate) => candidate.kind === kind);
  if (part === undefined) throw new Error(kind);
  return part;
};

describe.each(kinds)('a %s', (kind) => {
  const part = partOf(kind);

  it('moves with its handles', () => {
    const before = listHandles(part, full.values);
    const after = listHandles(movePart(part, 0.004, -0.001), full.values);
    expect(after.map(({ name }) => name)).toEqual(before.map(({ name }) => name));
    for (const [k, { at }] of after.entries()) {
      expect(at[0]).toBeCloseTo((before[k]?.at[0] ?? 0) + 0.004, 10);
      expect(at[1]).toBeCloseTo((before[k]?.at[1] ?? 0) - 0.001, 10);
    }
  });

  it('follows a handle dragged to where it is by not changing in size', () => {
    for (const { name, at } of listHandles(part, full.values)) {
      expect(area(dragHandle(part, name, at[0], at[1], full.values)) / area(part)).toBeCloseTo(1, 9);
    }
  });

  it('has a dimension that can be set to a typed text and then reads so', () => {
    for (const { name, value, dimension } of listDimensions(part, full.values)) {
      if (dimension === 'angle') continue;
      const larger = setDimension(part, name, `${value * 1e3 + 1} mm`, full.values);
      if (!larger.ok) throw new Error(larger.errors[0].message);
      const again = listDimensions(larger.value, full.values).find((one) => one.name === name);
      expect(again?.value).toBeCloseTo(value + 0.001, 10);
    }
  });

  it('says what it is in words and values that are there', () => {
    const sentence = describePart(part);
    expect(sentence.some((phrase) => 'path' in phrase && phrase.as === 'material')).toBe(true);
    for (const phrase of sentence) {
      if ('text' in phrase) continue;
      const value = phrase.path.reduce<unknown>((inner, step) => (inner as Record<string, unknown>)[step], part);
      expect(value).toBeDefined();
    }
  });

  it('leaves the part alone for a handle it does not have', () => {
    expect(area(dragHandle(part, 'nothing', 1, 1, full.values))).toBeCloseTo(area(part), 14);
  });

  it('refuses a dimension it does not have, or a text that is no length', () => {
    expect(setDimension(part, 'nothing', '1 mm', full.values).ok).toBe(false);
    const name = listDimensions(part, full.values)[0]?.name ?? '';
    expect(setDimension(part, name, '1 GHz', full.values).ok).toBe(false);
    expect(setDimension(part, name, 'foo', full.values).ok).toBe(false);
  });
});

describe('dragging', () => {
  it('keeps the unit a person chose', () => {
    const disc = makePart(job, 'disc', 'ptfe', { centre: ['1 in', '0.5 in'], radius: '0.1 in' });
    expect(dragHandle(disc, 'radius', 0.0254 + 0.00508, 0.0127, values)).toMatchObject({ radius: '0.2 in' });
    expect(dragHandle(disc, 'centre', 0.0508, 0.0127, values)).toMatchObject({ centre: ['2 in', '0.5 in'] });
  });

  it('keeps an expression and adds to it', () => {
    const disc = makePart(job, 'disc', 'ptfe', { centre: ['a/2', '5 mm'], radius: '1 mm' });
    expect(dragHandle(disc, 'centre', 0.012, 0.005, values)).toMatchObject({ centre: ['a/2 + 2 mm', '5 mm'] });
  });

  it('a side of a rectangle leaves the other three where they are, however it was drawn', () => {
    const rectangle = makePart(job, 'rectangle', 'ptfe', { from: ['30 mm', '20 mm'], to: ['10 mm', '40 mm'] });
    expect(dragHandle(rectangle, 'right', 0.05, 0.9, values)).toMatchObject({ from: ['50 mm', '20 mm'], to: ['10 mm', '40 mm'] });
    expect(dragHandle(rectangle, 'left top', 0.005, 0.045, values)).toMatchObject({
      from: ['30 mm', '20 mm'],
      to: ['5 mm', '45 mm'],
    });
  });

  it('a wall by its thickness moves both faces', () => {
    const wall = makePart(job, 'wall', 'copper', {
      points: [
        ['0 mm', '0 mm'],
        ['40 mm', '0 mm'],
      ],
      thickness: '2 mm',
    });
    expect(dragHandle(wall, 'thickness', 0.02, 0.003, values)).toMatchObject({ thickness: '6 mm' });
    expect(dragHandle(wall, 'thickness', 0.02, 0, values)).toBe(wall);
  });

  it('a ring past its own other radius changes nothing', () => {
    const ring = makePart(job, 'ring', 'copper', {
      centre: ['0 mm', '0 mm'],
      inner: '5 mm',
      outer: '9 mm',
      from: '0 deg',
      to: '90 deg',
    });
    expect(dragHandle(ring, 'inner', 0.02, 0, values)).toBe(ring);
    expect(dragHandle(ring, 'to', 0.009, 0.009, values)).toMatchObject({ to: '45 deg' });
  });

  it('a ring by its end past a whole turn closes it', () => {
    const ring = { ...partOf('ring'), to: '350 deg' } as Part;
    const centre = listHandles(ring, full.values)[0]?.at ?? [0, 0];
    expect(dragHandle(ring, 'to', centre[0] + 0.009, centre[1] + 0.001, full.values)).toMatchObject({ to: '360 deg' });
  });
});

describe('setting a dimension', () => {
  it('of a rectangle moves its second corner and keeps a typed expression', () => {
    const rectangle = makePart(job, 'rectangle', 'ptfe', { from: ['10 mm', '20 mm'], to: ['30 mm', '5 mm'] });
    expect(setDimension(rectangle, 'width', '1 in', values)).toMatchObject({ value: { to: ['1.3937007874 in', '5 mm'] } });
    expect(setDimension(rectangle, 'width', 'a', values)).toMatchObject({ value: { to: ['10 mm + a', '5 mm'] } });
    expect(setDimension(rectangle, 'height', 'a', values)).toMatchObject({ value: { to: ['30 mm', '20 mm - (a)'] } });
  });

  it('of a side of a wall carries the rest along', () => {
    const wall = makePart(job, 'wall', 'copper', {
      points: [
        ['0 mm', '0 mm'],
        ['40 mm', '0 mm'],
        ['40 mm', '30 mm'],
      ],
      thickness: '2 mm',
    });
    expect(setDimension(wall, 'side 0', '50 mm', values)).toMatchObject({
      value: {
        points: [
          ['0 mm', '0 mm'],
          ['50 mm', '0 mm'],
          ['50 mm', '30 mm'],
        ],
      },
    });
  });
});

describe('a ring', () => {
  it.each([
    ['0 deg', '360 deg', 1],
    ['0 deg', '90 deg', 0.25],
    ['270 deg', '90 deg', 0.5],
    ['-90 deg', '90 deg', 0.5],
    ['0 deg', '720 deg', 1],
  ])('from %s to %s is %s of a turn', (from, to, share) => {
    const ring = makePart(job, 'ring', 'copper', { centre: ['0 mm', '0 mm'], inner: '5 mm', outer: '9 mm', from, to });
    expect(area(ring) / (Math.PI * (0.009 ** 2 - 0.005 ** 2))).toBeCloseTo(share, 9);
  });

  it('without an inner radius is a slice', () => {
    const ring = makePart(job, 'ring', 'copper', {
      centre: ['0 mm', '0 mm'],
      inner: '0 mm',
      outer: '9 mm',
      from: '0 deg',
      to: '90 deg',
    });
    expect(area(ring) / (Math.PI * 0.009 ** 2)).toBeCloseTo(0.25, 9);
  });
});
