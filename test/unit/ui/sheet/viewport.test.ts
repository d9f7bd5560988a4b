// Owns the facts of fitting, panning and zooming, of wheels and pads, of rulers and tidy lengths.
import { describe, expect, test } from 'vitest';
import { makeRuler, snapStep, stepAtLeast, ticksBetween, tidyLength } from '../../../../src/ui/sheet/ticks.ts';
import {
  boxToScreen,
  fitView,
  panView,
  resizeView,
  RULER_LEFT,
  RULER_TOP,
  toScreen,
  toSheet,
  zoomAt,
} from '../../../../src/ui/sheet/viewport.ts';
import { readWheel } from '../../../../src/ui/sheet/wheel.ts';

const BOX = { left: -0.1, bottom: -0.05, right: 0.2, top: 0.1 };
const SIZE = { width: 1000, height: 600 };

describe('viewport', () => {
  test('a fitted sheet lies wholly beside the rulers, whole and in the middle', () => {
    const { x, y, width, height } = boxToScreen(fitView(BOX, SIZE), BOX);
    expect(x).toBeGreaterThan(RULER_LEFT);
    expect(y).toBeGreaterThan(RULER_TOP);
    expect(x + width).toBeLessThan(SIZE.width);
    expect(y + height).toBeLessThan(SIZE.height);
    expect(x - RULER_LEFT).toBeCloseTo(SIZE.width - x - width, 9);
  });

  test('y points up', () => {
    const view = fitView(BOX, SIZE);
    expect(toScreen(view, [0, 0.1])[1]).toBeLessThan(toScreen(view, [0, 0])[1]);
  });

  test('screen and sheet coordinates undo each other', () => {
    const view = panView(fitView(BOX, SIZE), 13, -7);
    const [x, y] = toScreen(view, [0.0123, -0.0456]);
    const [backX, backY] = toSheet(view, x, y);
    expect(backX).toBeCloseTo(0.0123, 12);
    expect(backY).toBeCloseTo(-0.0456, 12);
  });

  test('zooming leaves what is under the pointer under the pointer', () => {
    const view = fitView(BOX, SIZE);
    const before = toSheet(view, 321, 234);
    const after = toSheet(zoomAt(view, 3.7, 321, 234, view.pixelsPerMetre), 321, 234);
    expect(after[0]).toBeCloseTo(before[0], 12);
    expect(after[1]).toBeCloseTo(before[1], 12);
  });

  test('zooming out stops while the sheet can still be seen', () => {
    const fitted = fitView(BOX, SIZE);
    let view = fitted;
    for (let k = 0; k < 200; k++) view = zoomAt(view, 0.8, 500, 300, fitted.pixelsPerMetre);
    expect(boxToScreen(view, BOX).width).toBeGreaterThan(100);
  });

  test('a resized element keeps its middle', () => {
    const view = resizeView(fitView(BOX, SIZE), SIZE, { width: 1200, height: 500 });
    expect(toSheet(view, 600, 250)).toEqual(toSheet(fitView(BOX, SIZE), 500, 300));
  });
});

describe('wheel', () => {
  const rest = { deltaX: 0, deltaY: 0, deltaMode: 0, ctrl: false, shift: false };

  test('a notch of a mouse wheel zooms, towards the person out', () => {
    const meaning = readWheel({ ...rest, deltaY: 100 });
    expect(meaning.kind === 'zoom' && meaning.factor).toBeLessThan(1);
  });

  test('two fingers on a pad pan', () => {
    expect(readWheel({ ...rest, deltaX: 3, deltaY: -12.5 })).toEqual({ kind: 'pan', dx: -3, dy: 12.5 });
  });

  test('pinching zooms however small the step', () => {
    const meaning = readWheel({ ...rest, deltaY: -2.5, ctrl: true });
    expect(meaning.kind === 'zoom' && meaning.factor).toBeGreaterThan(1);
  });

  test('Shift and a mouse wheel pan sideways', () => {
    expect(readWheel({ ...rest, deltaY: 100, shift: true })).toEqual({ kind: 'pan', dx: -100, dy: 0 });
  });
});

describe('rulers', () => {
  test('steps are 1, 2 or 5 times a power of ten and not below what is asked', () => {
    expect([0.9e-3, 1e-3, 1.1e-3, 2.1e-3, 5e-3, 5.1e-3, 0.3].map(stepAtLeast)).toEqual([1e-3, 1e-3, 2e-3, 5e-3, 5e-3, 1e-2, 0.5]);
  });

  test('millimetres below a metre, metres above', () => {
    expect(makeRuler(1000).unit.name).toBe('mm');
    expect(makeRuler(20).unit.name).toBe('m');
    expect(makeRuler(1e7).unit.name).toBe('µm');
  });

  test('labels are round numbers of the unit, with a true minus sign', () => {
    const labels = ticksBetween(makeRuler(1600), -0.06, 0.11).flatMap((tick) => (tick.label === null ? [] : [tick.label]));
    expect(labels).toEqual(['−50', '0', '50', '100']);
  });

  test('small ticks divide the distance between labels evenly', () => {
    const ticks = ticksBetween(makeRuler(1600), 0, 0.1).map((tick) => Math.round(tick.at * 1e6));
    expect(ticks).toEqual([0, 10000, 20000, 30000, 40000, 50000, 60000, 70000, 80000, 90000, 100000]);
  });

  test('the snapping grid is never finer than a hand can point', () => {
    for (const scale of [3, 170, 1600, 12345, 9e6]) {
      expect(snapStep(scale) * scale).toBeGreaterThanOrEqual(7 * (1 - 1e-9));
      expect(snapStep(scale) * scale).toBeLessThan(18);
    }
  });
});

describe('tidy quantities', () => {
  test.each([
    [0.22, '220 mm'],
    [0.1 + 0.2, '300 mm'],
    [-0.0005, '-0.5 mm'],
    [1e-17, '0 mm'],
    [0.02286, '22.86 mm'],
    [12, '12 m'],
    [2.5e-7, '250 nm'],
  ])('%d m is written %s', (metres, text) => {
    expect(tidyLength(metres)).toBe(text);
  });
});
