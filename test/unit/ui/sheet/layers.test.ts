// Owns the facts of what layers draw, told by a recorder in place of a canvas.
import { describe, expect, test } from 'vitest';
import type { ResolvedDrive } from '../../../../src/model/job.ts';
import type { LayerContext, Surface } from '../../../../src/ui/sheet/layers/context.ts';
import { driveBoxes, drawDrives, planeWaveFront } from '../../../../src/ui/sheet/layers/drives-layer.ts';
import { drawEdges, edgeWords, sheetBox } from '../../../../src/ui/sheet/layers/edges-layer.ts';
import { drawField } from '../../../../src/ui/sheet/layers/field-layer.ts';
import { drawNames, drawParts, tintOpacity } from '../../../../src/ui/sheet/layers/parts-layer.ts';
import { drawProbes } from '../../../../src/ui/sheet/layers/probes-layer.ts';
import { drawRulers } from '../../../../src/ui/sheet/layers/rulers-layer.ts';
import { drawScaleStrip, legendLabel, scaleWords } from '../../../../src/ui/sheet/layers/scale-layer.ts';
import { placeDimensions } from '../../../../src/ui/sheet/layers/selection-layer.ts';
import { makePalette } from '../../../../src/ui/sheet/palette.ts';
import { fitView } from '../../../../src/ui/sheet/viewport.ts';
import { makeTestJob, resolved } from './sheet-fixture.ts';

interface Call {
  readonly name: string;
  readonly args: readonly unknown[];
  readonly dash: readonly number[];
  readonly fillStyle: unknown;
  readonly composite: unknown;
}

/** Records every call with the state that matters; text is 6 px a letter. */
function recorder(): { context: LayerContext; calls: Call[] } {
  const calls: Call[] = [];
  let dash: readonly number[] = [];
  const state: Record<string, unknown> = { globalCompositeOperation: 'source-over' };
  const context = new Proxy(state, {
    get: (target, name: string) => {
      if (name in target) return target[name];
      return (...args: unknown[]) => {
        if (name === 'setLineDash') dash = args[0] as readonly number[];
        calls.push({ name, args, dash, fillStyle: state['fillStyle'], composite: state['globalCompositeOperation'] });
        if (name === 'measureText') return { width: 6 * String(args[0]).length };
        if (name.startsWith('create')) return { addColorStop: () => undefined };
        return undefined;
      };
    },
  }) as unknown as LayerContext;
  return { context, calls };
}

const COLOURS: Record<string, string> = { '--sheet': '#fbfaf5', '--paper': '#f5f2ea', '--metal': '#3d4349', '--ink': '#23272c' };
const JOB = makeTestJob();
const RESOLVED = resolved(JOB);
const SIZE = { width: 900, height: 520 };

function surface(): { surface: Surface; calls: Call[] } {
  const { context, calls } = recorder();
  const palette = makePalette((name) => COLOURS[name] ?? '#888888', 'light');
  return { surface: { context, calls, palette, size: SIZE, view: fitView(sheetBox(RESOLVED.sheet), SIZE) } as Surface, calls };
}

function texts(calls: readonly Call[]): readonly unknown[] {
  return calls.filter((call) => call.name === 'fillText').map((call) => call.args[0]);
}

describe('names', () => {
  test('the name of a part keeps clear of the name of a line current that stands in it', () => {
    const { surface: to, calls } = surface();
    const [x, y] = [0.06, 0.05];
    const source: ResolvedDrive = {
      id: 'source',
      name: 'Source',
      kind: 'line current',
      at: [x, y],
      amplitude: 1,
      waveform: { kind: 'band pulse' },
    };
    const corners = [-0.01, 0.15, 0.15, -0.01].map((dx, k): [number, number] => [x + dx, y + (k < 2 ? -0.01 : 0.01)]);
    const medium = { ...RESOLVED.sheet.background, epsilonRelative: 3 };
    const [box] = driveBoxes(to, [source]);
    drawNames(to, [{ ...RESOLVED.parts[0]!, name: 'Long straight', medium, outline: [corners] }], [box!]);
    const drawn = calls.find((call) => call.name === 'fillText')!;
    const [left, middle] = [Number(drawn.args[1]), Number(drawn.args[2])];
    const right = left + 6 * 'Long straight'.length;
    expect(left > box!.right || right < box!.left || middle - 7 > box!.bottom || middle + 7 < box!.top).toBe(true);
  });
});

describe('parts', () => {
  test('metal is hatched, a dielectric is not', () => {
    const metal = surface();
    drawParts(metal.surface, RESOLVED.parts.slice(0, 1));
    const dielectric = surface();
    drawParts(
      dielectric.surface,
      RESOLVED.parts.slice(2, 3).map((part) => ({ ...part, medium: { ...part.medium, sigma: 0 } })),
    );
    const clips = (calls: readonly Call[]): number => calls.filter((call) => call.name === 'clip').length;
    expect(clips(metal.calls)).toBe(1);
    expect(clips(dielectric.calls)).toBe(0);
  });

  test('every part first clears what lies under it', () => {
    const { surface: on, calls } = surface();
    drawParts(on, RESOLVED.parts);
    expect(calls.filter((call) => call.name === 'fill' && call.composite === 'destination-out')).toHaveLength(
      RESOLVED.parts.length,
    );
  });

  test('a part left out of the reference has a dashed outline, another a solid one', () => {
    for (const part of RESOLVED.parts.slice(0, 2)) {
      const { surface: on, calls } = surface();
      drawParts(on, [part]);
      const outline = calls.filter((call) => call.name === 'stroke').at(-1);
      expect(outline?.dash.length).toBe(part.leftOutOfReference ? 2 : 0);
    }
  });

  test('the tint grows with permittivity and leaves air clear', () => {
    expect(tintOpacity(1)).toBe(0);
    expect(tintOpacity(2.1)).toBeLessThan(tintOpacity(4.4));
    expect(tintOpacity(80)).toBeLessThan(0.7);
  });
});

describe('drives and probes', () => {
  const sheet = sheetBox(RESOLVED.sheet);

  test('the front of a wave along x is upright, near the left edge and as high as the sheet', () => {
    const ends = planeWaveFront(sheet, 0);
    for (const [x] of ends) expect(x).toBeCloseTo(0.014, 9);
    expect(ends.map((end) => end[1]).sort((a, b) => a - b)).toEqual([0, 0.1]);
  });

  test('the front of a wave downwards lies near the top edge', () => {
    for (const [, y] of planeWaveFront(sheet, -Math.PI / 2)) expect(y).toBeCloseTo(0.093, 9);
  });

  test('a current out of the plane has a dot, into it a cross', () => {
    const wire = RESOLVED.drives[0] as ResolvedDrive & { kind: 'line current' };
    const strokes = (amplitude: number): number => {
      const { surface: on, calls } = surface();
      drawDrives(on, [{ ...wire, amplitude }], sheet, 'E out of plane');
      return calls.filter((call) => call.name === 'stroke').length;
    };
    expect(strokes(-1) - strokes(1)).toBe(2);
  });

  test('probes are numbered in their order', () => {
    const { surface: on, calls } = surface();
    drawProbes(on, RESOLVED.probes);
    expect(texts(calls)).toEqual(['1', '2']);
  });
});

describe('the sheet', () => {
  test('every edge is named in words in the margin', () => {
    const { surface: on, calls } = surface();
    drawEdges(on, RESOLVED.sheet);
    expect(
      texts(calls)
        .map(String)
        .sort((a, b) => a.localeCompare(b)),
    ).toEqual(['absorbing edge', 'absorbing edge', 'metal edge', 'metal edge']);
    expect(edgeWords('left', 'repeating')).toBe('repeats at the right edge');
  });

  test('the field runs on into absorbing edges only', () => {
    const { surface: on, calls } = surface();
    drawField(on, RESOLVED.sheet, { image: {} as CanvasImageSource, width: 40, height: 20 });
    expect(calls.filter((call) => call.name === 'drawImage')).toHaveLength(3);
    expect(calls.filter((call) => call.name === 'createLinearGradient')).toHaveLength(2);
  });

  test('rulers say their unit and follow the cursor on both sides', () => {
    const without = surface();
    drawRulers(without.surface, sheetBox(RESOLVED.sheet), null);
    const withCursor = surface();
    drawRulers(withCursor.surface, sheetBox(RESOLVED.sheet), [0.05, 0.05]);
    expect(texts(without.calls)).toContain('mm');
    expect(texts(without.calls)).toContain('100');
    const marks = (calls: readonly Call[]): number => calls.filter((call) => call.name === 'fill').length;
    expect(marks(withCursor.calls) - marks(without.calls)).toBe(2);
  });

  test('the foot names materials with their permittivity, and says how many had no room', () => {
    const medium = { metal: false, epsilonRelative: 4.4, muRelative: 1, sigma: 0, sigmaMagnetic: 0 };
    expect(legendLabel({ name: 'FR-4', medium })).toBe('FR-4, εr 4.4');
    const many = Array.from({ length: 12 }, (_, k) => ({ name: `material number ${k}`, medium }));
    const { surface: on, calls } = surface();
    drawScaleStrip(on, many, null, 14);
    const shown = texts(calls).filter((text) => String(text).startsWith('material'));
    expect(texts(calls)).toContain(`+ ${12 - shown.length}`);
  });

  test('the colour scale carries the unit of what is shown', () => {
    expect(scaleWords({ view: 'Hz', fullScale: 0.775, spanDb: 60 })).toEqual({ low: '−775', high: '+775 mA/m', title: 'Hz' });
    expect(scaleWords({ view: '|E|', fullScale: 348, spanDb: 60 })).toEqual({
      low: '−60',
      high: '0 dB re 348 V/m',
      title: '|E|',
    });
  });
});

test('dimensions of a rectangle stand outside of it', () => {
  const board = JOB.parts[2];
  if (board === undefined) throw new Error('the fixture has a board');
  const view = fitView(sheetBox(RESOLVED.sheet), SIZE);
  const [width, height] = placeDimensions(board, JOB, view, SIZE);
  expect(width?.text).toBe('30 mm');
  expect(height?.text).toBe('10 mm');
  expect(width?.from[1]).toBeGreaterThan(width?.feet[0][1] ?? Infinity);
  expect(height?.from[0]).toBeLessThan(height?.feet[0][0] ?? -Infinity);
});
