// Owns the facts of the chrome over the canvas: numbers of dimensions, coordinates, words for the ear.
import { describe, expect, test } from 'vitest';
import { placeDimensions } from '../../../../src/ui/sheet/layers/selection-layer.ts';
import { makeOverlay, type OverlayInput } from '../../../../src/ui/sheet/sheet-overlay.ts';
import { SELECT_AT_REST } from '../../../../src/ui/sheet/tools/select-tool.ts';
import { fitView, toScreen } from '../../../../src/ui/sheet/viewport.ts';
import { makeTestJob, mm, resolved } from './sheet-fixture.ts';

const JOB = makeTestJob();
const SIZE = { width: 900, height: 520 };
const VIEW = fitView({ left: 0, bottom: 0, right: 0.2, top: 0.1 }, SIZE);

function overlay(extra: Partial<OverlayInput>): ReturnType<typeof makeOverlay> {
  const part = JOB.parts.find((candidate) => candidate.id === extra.selection?.[0]);
  return makeOverlay({
    job: JOB,
    resolved: resolved(JOB),
    selection: [],
    view: VIEW,
    size: SIZE,
    dimensions: part === undefined ? [] : placeDimensions(part, JOB, VIEW, SIZE),
    editing: null,
    tool: SELECT_AT_REST,
    typed: null,
    snap: null,
    cursor: null,
    refusal: null,
    broken: null,
    ...extra,
  });
}

describe('chrome over the sheet', () => {
  test('a dimension said by a named value shows both, and its field opens with what was written', () => {
    expect(overlay({ selection: ['disc-1'] }).chips).toMatchObject([{ name: 'radius', label: 'a/2 = 10 mm', text: 'a/2' }]);
  });

  test('a plain dimension shows its value alone', () => {
    expect(overlay({ selection: ['wall-1'] }).chips[0]).toMatchObject({ name: 'thickness', label: '4 mm', text: '4 mm' });
  });

  test('the selection is told in words', () => {
    expect(overlay({ selection: ['probe-1'] }).said).toBe('Probe 1 selected, at 90 mm, 70 mm.');
    expect(overlay({ selection: ['wall-1'] }).said).toBe('Door selected, a wall of perfect-metal, painted 1 of 3.');
    expect(overlay({ selection: ['wall-1', 'disc-1'] }).said).toBe('2 things selected: Door, Rod.');
  });

  test('the coordinates are those of the pointer, or of what it meets', () => {
    expect(overlay({ cursor: mm(33.3, 44.4) }).readout).toEqual({ x: '33.2 mm', y: '44.4 mm' });
    const snap = { at: mm(150, 20), kind: 'point', words: 'corner of Board' } as const;
    expect(overlay({ cursor: mm(149.2, 20.7), snap }).readout).toEqual({ x: '150 mm', y: '20 mm' });
  });

  test('the typing box turns to the other side where there is no room', () => {
    const typed = { at: mm(195, 5), fields: [], active: 0, problem: null };
    const [x, y] = toScreen(VIEW, mm(195, 5));
    const placed = overlay({ typed }).typed;
    expect(placed?.x).toBeLessThan(x);
    expect(placed?.y).toBeLessThan(y);
  });

  test('a refused edit and a job without numbers are told instead of the hint', () => {
    const refusal = {
      code: 'range',
      path: 'parts[0].thickness',
      message: '"0 mm" is not above zero.',
      hint: 'Give a length above zero.',
    };
    expect(overlay({ refusal })).toMatchObject({ troubled: true, hint: expect.stringContaining('Give a length above zero.') });
    expect(overlay({ broken: refusal }).hint).toMatch(/^The last good drawing is shown\./);
  });
});
