import { expect, test } from 'vitest';
import { rankCommand } from '../../../../src/ui/shell/CommandFinder.tsx';

test('a command is found by its own words and, after those, by other words for it', () => {
  expect(rankCommand('Add a plane wave', 'plane')).toBe(1);
  expect(rankCommand('Add a plane wave', 'excitation', ['drive', 'source', 'excitation'])).toBe(0.5);
  expect(rankCommand('Add a plane wave', 'source pla', ['source'])).toBe(0.5);
});

test('letters inside a word or scattered over it find nothing', () => {
  expect(rankCommand('Export spectrum (CSV)', 'excitation', ['download'])).toBe(0);
  expect(rankCommand('Add a plane wave', 'lane')).toBe(0);
});

test('nothing typed finds everything', () => {
  expect(rankCommand('Run', '')).toBe(1);
});
