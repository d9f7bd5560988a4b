import { describe, expect, it } from 'vitest';
import { findNearestWord } from '../../../src/base/nearest-word.ts';

describe('the nearest word', () => {
  const known = ['thickness', 'points', 'material', 'leftOutOfReference'];

  it('is found through slips of the finger', () => {
    expect(findNearestWord('thicknes', known)).toBe('thickness');
    expect(findNearestWord('piont', known)).toBe('points');
    expect(findNearestWord('Material', known)).toBe('material');
    expect(findNearestWord('leftOut', known)).toBe('leftOutOfReference');
  });

  it('is not invented for a strange one', () => {
    expect(findNearestWord('colour', known)).toBeUndefined();
    expect(findNearestWord('x'.repeat(100), known)).toBeUndefined();
  });
});
