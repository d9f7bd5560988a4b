import { expect, test } from 'vitest';
import { readShortcut } from '../../../../src/ui/shell/use-shortcuts.ts';

const press = (key: string, mods: Partial<Record<'ctrlKey' | 'metaKey' | 'shiftKey' | 'altKey', boolean>> = { ctrlKey: true }) =>
  readShortcut({ key, ctrlKey: false, metaKey: false, shiftKey: false, altKey: false, ...mods });

test.each([
  ['z', { ctrlKey: true }, 'undo'],
  ['Z', { ctrlKey: true, shiftKey: true }, 'redo'],
  ['y', { ctrlKey: true }, 'redo'],
  ['z', { metaKey: true }, 'undo'],
  ['k', { ctrlKey: true }, 'find'],
  ['s', { ctrlKey: true }, 'save'],
  ['o', { ctrlKey: true }, 'open'],
])('%s with %o is %s', (key, mods, shortcut) => {
  expect(press(key, mods)).toBe(shortcut);
});

test('plain letters and Alt combinations are nobody’s', () => {
  expect(press('z', {})).toBeNull();
  expect(press('z', { ctrlKey: true, altKey: true })).toBeNull();
});
