import { describe, expect, test } from 'vitest';
import type { Part } from '../../../src/model/job.ts';
import { makeEmptyJob } from '../../../src/model/new-job.ts';
import { isPartsTable, readPartsTable, writePartsTable } from '../../../src/model/parts-table.ts';
import { parseJob } from '../../../src/model/parse-job.ts';

const job = makeEmptyJob();

function partsOf(text: string): readonly Part[] {
  const read = readPartsTable(text, job, 'aluminium');
  if (!read.ok) throw new Error(read.errors.map((error) => `${error.path} ${error.message} ${error.hint}`).join('\n'));
  return read.value;
}

function faultsOf(text: string): string[] {
  const read = readPartsTable(text, job, 'aluminium');
  return read.ok ? [] : read.errors.map(({ path, message }) => `${path}: ${message}`);
}

describe('rows of a spreadsheet', () => {
  test('make parts of every kind, bare lengths in millimetres', () => {
    const parts = partsOf(
      [
        'wall\taluminium\t2\t10\t0\t10\t40',
        'rectangle\t\t1,5\t2\t0.25 in\t8',
        'disc\tAir\t20\t20\t3',
        'ring\t\t30\t30\t4\t6\t0\t90',
        'polygon\t\t0\t0\t5\t0\t0\t5',
        'stroke\tair\t1\t3\t3\t4\t4',
      ].join('\r\n'),
    );
    expect(parts.map(({ kind, material }) => `${kind} of ${material}`)).toEqual([
      'wall of aluminium',
      'rectangle of aluminium',
      'disc of air',
      'ring of aluminium',
      'polygon of aluminium',
      'stroke of air',
    ]);
    expect(parts[0]).toMatchObject({
      thickness: '2 mm',
      points: [
        ['10 mm', '0 mm'],
        ['10 mm', '40 mm'],
      ],
    });
    expect(parts[1]).toMatchObject({ from: ['1.5 mm', '2 mm'], to: ['0.25 in', '8 mm'] });
    expect(parts[3]).toMatchObject({ inner: '4 mm', outer: '6 mm', from: '0 deg', to: '90 deg' });
    expect(new Set(parts.map((part) => part.id)).size).toBe(6);
    expect(new Set(parts.map((part) => part.name)).size).toBe(6);
    expect(parseJob({ ...job, parts }).ok).toBe(true);
  });

  test('may stand under a heading and between empty lines', () => {
    expect(partsOf('kind\tmaterial\tx\ty\tr\n\ndisc\t\t1\t2\t3\n\n')).toHaveLength(1);
  });

  test('copied from parts make the same parts again', () => {
    const parts = partsOf('wall\t\t2\t10\t0\t10\t40\ndisc\tair\t20\t20\t3\nring\t\t1\t1\t2\t3\t0\t45');
    expect(partsOf(writePartsTable(parts))).toEqual(parts);
  });

  test('that cannot be read are refused with their number and what is wrong', () => {
    expect(faultsOf('disc\t\t1\t2\t3\ndisk\t\t1\t2\t3')).toEqual(['row 2: "disk" is no kind of part.']);
    expect(faultsOf('disc\tcheese\t1\t2\t3')).toEqual(['row 1: "cheese" is no material of the list or of the job.']);
    expect(faultsOf('wall\t\t1\t2\t3')).toEqual(['row 1: A wall cannot be made of 3 numbers.']);
    expect(faultsOf('ring\t\t1\t2\t3\t4\t5')).toEqual(['row 1: A ring cannot be made of 5 numbers.']);
  });

  test('are told from other text', () => {
    expect(isPartsTable('disc\t\t1\t2\t3')).toBe(true);
    expect(isPartsTable('disc 1 2 3')).toBe(false);
    expect(isPartsTable('a\tb\n1\t2')).toBe(false);
    expect(isPartsTable('')).toBe(false);
  });
});
