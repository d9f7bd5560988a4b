// Owns the facts of adding corners to parts on the sheet and taking them away.
import { expect, test } from 'vitest';
import type { Part } from '../../../../src/model/job.ts';
import { addCorner, dropCorner } from '../../../../src/ui/sheet/tools/corners.ts';
import type { ToolAction } from '../../../../src/ui/sheet/tools/tool.ts';
import { makeTestJob, mm } from './sheet-fixture.ts';

const place = { job: makeTestJob(), pixelsPerMetre: 2000 };
const base = { id: 'a', name: 'A', material: 'air', leftOutOfReference: false } as const;
const triangle: Part = {
  ...base,
  kind: 'polygon',
  points: [
    ['0 mm', '0 mm'],
    ['40 mm', '0 mm'],
    ['0 mm', '40 mm'],
  ],
};
const wall: Part = {
  ...base,
  kind: 'wall',
  thickness: '2 mm',
  points: [
    ['0 mm', '0 mm'],
    ['40 mm', '0 mm'],
  ],
};

function points(action: ToolAction | null): unknown {
  return action?.do === 'edit' && action.command.do === 'put' && 'points' in action.command.item
    ? action.command.item.points
    : null;
}

test('a corner is added on the side under the pointer, between its two ends', () => {
  expect(points(addCorner(triangle, mm(20.1, 1), place))).toEqual([
    ['0 mm', '0 mm'],
    ['20 mm', '0 mm'],
    ['40 mm', '0 mm'],
    ['0 mm', '40 mm'],
  ]);
  expect(points(addCorner(wall, mm(10, -2), place))).toEqual([
    ['0 mm', '0 mm'],
    ['10 mm', '0 mm'],
    ['40 mm', '0 mm'],
  ]);
});

test('the side that closes a polygon can have one too, an open line has no such side', () => {
  expect(points(addCorner(triangle, mm(1, 20), place))).toHaveLength(4);
  expect(addCorner(wall, mm(20, 15), place)).toBeNull();
});

test('a corner under the pointer is taken away, but not the last that the part needs', () => {
  const square: Part = { ...triangle, points: [...triangle.points, ['40 mm', '40 mm']] };
  expect(points(dropCorner(square, mm(39, 41), place))).toEqual(triangle.points);
  expect(dropCorner(square, mm(20, 20), place)).toBeNull();
  expect(dropCorner(triangle, mm(0, 0), place)).toBeNull();
});

test('parts without corners of their own are left alone', () => {
  const disc: Part = { ...base, kind: 'disc', centre: ['0 mm', '0 mm'], radius: '10 mm' };
  expect(addCorner(disc, mm(10, 0), place)).toBeNull();
  expect(dropCorner(disc, mm(10, 0), place)).toBeNull();
});
