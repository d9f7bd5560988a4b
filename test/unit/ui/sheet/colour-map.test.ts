// Owns the facts of the field's colours: evenness, safety for colour-blind eyes, and frames turned into pixels.
import { describe, expect, test } from 'vitest';
import type { FieldFrame } from '../../../../workers/protocol.ts';
import {
  labFromRgb,
  makeDivergingMap,
  makeSequentialMap,
  MAP_ENTRIES,
  parseColour,
  rgbFromLab,
  type ColourMap,
  type Rgb,
} from '../../../../src/ui/sheet/colour-map.ts';
import { followLevel, paintComponentInto, paintDecibelsInto, strongLevel } from '../../../../src/ui/sheet/field-image.ts';
import { rememberScale } from '../../../../src/ui/sheet/field-picture.ts';

const SHEETS = { light: parseColour('#fbfaf5'), dark: parseColour('#101315') } as const;
const THEMES = ['light', 'dark'] as const;

function rgbAt(map: ColourMap, entry: number): Rgb {
  const pixel = map[entry] ?? 0;
  return [pixel & 255, (pixel >> 8) & 255, (pixel >> 16) & 255];
}

function difference(p: Rgb, q: Rgb): number {
  const [a, b] = [labFromRgb(p), labFromRgb(q)];
  return Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]);
}

/**
 * How dichromats see linear RGB: severity 1.0 of Machado, Oliveira & Fernandes, "A physiologically-based model for
 * simulation of color vision deficiency", IEEE TVCG 15 (2009) 1291 (from memory).
 */
const DICHROMATS: Record<string, readonly (readonly [number, number, number])[]> = {
  protanope: [
    [0.152286, 1.052583, -0.204868],
    [0.114503, 0.786281, 0.099216],
    [-0.003882, -0.048116, 1.051998],
  ],
  deuteranope: [
    [0.367322, 0.860646, -0.227968],
    [0.280085, 0.672501, 0.047413],
    [-0.01182, 0.04294, 0.968881],
  ],
  tritanope: [
    [1.255528, -0.076749, -0.178779],
    [-0.078411, 0.930809, 0.147602],
    [0.004733, 0.691367, 0.3039],
  ],
};

function seenBy(matrix: readonly (readonly [number, number, number])[], rgb: Rgb): Rgb {
  const linear = rgb.map((v) => (v / 255 <= 0.04045 ? v / 255 / 12.92 : ((v / 255 + 0.055) / 1.055) ** 2.4));
  return matrix.map((row) => {
    const v = Math.min(
      1,
      Math.max(
        0,
        row.reduce((sum, weight, k) => sum + weight * (linear[k] ?? 0), 0),
      ),
    );
    return 255 * (v <= 0.0031308 ? 12.92 * v : 1.055 * v ** (1 / 2.4) - 0.055);
  }) as unknown as Rgb;
}

test('OKLab of sRGB red is the published one', () => {
  // CSS Color Module Level 4, W3C: oklab(62.7955% 0.22486 0.12585), from memory.
  const [L, a, b] = labFromRgb([255, 0, 0]);
  expect(L).toBeCloseTo(0.627955, 4);
  expect(a).toBeCloseTo(0.22486, 4);
  expect(b).toBeCloseTo(0.12585, 4);
  expect(rgbFromLab([L, a, b])[0]).toBeCloseTo(255, 2);
});

describe.each(THEMES)('the %s maps', (theme) => {
  const diverging = makeDivergingMap(SHEETS[theme], theme);
  const sequential = makeSequentialMap(SHEETS[theme], theme);

  test('zero is the colour of the sheet', () => {
    for (const middle of [511, 512]) expect(difference(rgbAt(diverging, middle), SHEETS[theme])).toBeLessThan(0.005);
    expect(rgbAt(sequential, 0)).toEqual(SHEETS[theme]);
  });

  test('equal steps look equal along each arm and along the decibels', () => {
    for (const [map, ranges] of [
      [
        diverging,
        [
          [0, 511],
          [512, 1023],
        ],
      ],
      [sequential, [[0, 1023]]],
    ] as const) {
      for (const [from, to] of ranges) {
        const steps = Array.from({ length: 8 }, (_, k) => {
          const at = (n: number): number => Math.round(from + ((to - from) * n) / 8);
          return difference(rgbAt(map, at(k)), rgbAt(map, at(k + 1)));
        });
        // Straight chords over bends of the path and 8-bit channels account for the rest.
        expect(Math.max(...steps) / Math.min(...steps)).toBeLessThan(1.12);
      }
    }
  });

  test('plus and minus stand off equally from zero', () => {
    const arms = [0, MAP_ENTRIES - 1].map((end) => difference(rgbAt(diverging, end), SHEETS[theme]));
    expect((arms[0] ?? 0) / (arms[1] ?? 1)).toBeGreaterThan(0.85);
    expect((arms[0] ?? 0) / (arms[1] ?? 1)).toBeLessThan(1.15);
  });

  test('lightness alone orders the strength', () => {
    const lightness = (map: ColourMap, entry: number): number => labFromRgb(rgbAt(map, entry))[0];
    const outward = theme === 'light' ? -1 : 1;
    for (let k = 0; k + 64 < 512; k += 64) {
      expect(outward * (lightness(diverging, 512 + k + 63) - lightness(diverging, 512 + k))).toBeGreaterThan(0);
      expect(outward * (lightness(diverging, 511 - k - 63) - lightness(diverging, 511 - k))).toBeGreaterThan(0);
    }
    for (let k = 0; k + 128 < 1024; k += 128) {
      expect(outward * (lightness(sequential, k + 128) - lightness(sequential, k))).toBeGreaterThan(0);
    }
  });

  test.each(Object.keys(DICHROMATS))('a %s tells plus from minus', (kind) => {
    const matrix = DICHROMATS[kind] ?? [];
    for (const [minus, plus] of [
      [0, 1023],
      [256, 767],
    ] as const) {
      const apart = difference(seenBy(matrix, rgbAt(diverging, minus)), seenBy(matrix, rgbAt(diverging, plus)));
      // Ten just noticeable differences of 0.02 or so at the tips, five half-way.
      expect(apart).toBeGreaterThan(minus === 0 ? 0.15 : 0.075);
    }
  });

  test('the tips lie inside what a screen can show', () => {
    for (const end of [0, MAP_ENTRIES - 1]) {
      for (const channel of rgbAt(diverging, end)) expect(channel).toBeLessThan(255);
      expect(Math.min(...rgbAt(diverging, end))).toBeGreaterThan(0);
    }
  });
});

function frame(values: readonly number[], width: number, extra: Partial<FieldFrame> = {}): FieldFrame {
  return {
    view: 'Ez',
    width,
    height: values.length / width,
    values: Float32Array.from(values),
    step: 1,
    timeSeconds: 0,
    peak: Math.max(...values.map(Math.abs)),
    ...extra,
  };
}

/** A map whose entries are their own numbers. */
const INDEX_MAP = Uint32Array.from({ length: MAP_ENTRIES }, (_, k) => k);

describe('frames into pixels', () => {
  test('the bottom row of the frame is the last row of the picture', () => {
    const pixels = new Uint32Array(4);
    paintComponentInto(pixels, frame([-1, 1, 0, 0], 2), INDEX_MAP, 1);
    expect([...pixels]).toEqual([512, 512, 0, 1023]);
  });

  test('values beyond full scale keep the last colour and a field that is not finite does not break out of the map', () => {
    const pixels = new Uint32Array(4);
    paintComponentInto(pixels, frame([-7, 7, Number.NaN, Infinity], 4), INDEX_MAP, 2);
    expect(pixels[0]).toBe(0);
    expect(pixels[1]).toBe(1023);
    for (const pixel of pixels) expect(pixel).toBeLessThan(MAP_ENTRIES);
  });

  test('0 dB is the last entry, the span below it the first, and decibels are even between', () => {
    const pixels = new Uint32Array(5);
    paintDecibelsInto(pixels, frame([2, 2e-1, 2e-2, 2e-3, 0], 5, { view: '|E|' }), INDEX_MAP, 2, 60);
    // The look-up is good to 0.04 dB: 0.7 of an entry, and one for rounding.
    [1023, 682, 341, 0, 0].forEach((entry, k) => expect(Math.abs((pixels[k] ?? -9) - entry)).toBeLessThanOrEqual(2));
  });
});

describe('automatic scale', () => {
  test('one hot cell does not blank the rest of the sheet', () => {
    const values = Array.from({ length: 10_000 }, (_, k) => Math.sin(k / 50));
    values[5050] = 4;
    expect(strongLevel(frame(values, 100))).toBeLessThan(1.2);
  });

  test('a pulse smaller than one cell in a hundred is still seen', () => {
    const values = Array.from({ length: 10_000 }, () => 0);
    values[77] = 5;
    expect(strongLevel(frame(values, 100))).toBe(1);
  });

  test('the scale rises faster than it sinks', () => {
    expect(followLevel(1, 3) - 1).toBeGreaterThan(1 - followLevel(1, 0));
  });

  test('a new run starts the scale afresh, the same frame leaves it', () => {
    const first = rememberScale(null, frame([8, 8, 8], 3, { step: 900 }), false);
    expect(rememberScale(first, frame([1, 1, 1], 3, { step: 900 }), false)).toBe(first);
    expect(rememberScale(first, frame([1, 1, 1], 3, { step: 1 }), false).scale).toBe(1);
  });

  test('at rest the scale fits the frame shown', () => {
    const running = rememberScale(null, frame([8, 8, 8], 3, { step: 1 }), false);
    const last = frame([0.02, 0.02, 0.02], 3, { step: 2 });
    expect(rememberScale(running, last, false).scale).toBeGreaterThan(7);
    expect(rememberScale(rememberScale(running, last, false), last, true).scale).toBeCloseTo(0.02, 9);
  });

  test('rounding noise is not blown up to full colour', () => {
    const running = rememberScale(null, frame([1, 1, 1], 3, { step: 1 }), false);
    expect(rememberScale(running, frame([1e-9, 1e-9, 1e-9], 3, { step: 2 }), true).scale).toBeCloseTo(1e-4, 12);
  });
});
