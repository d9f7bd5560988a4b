// Owns the colours of the field: perceptually even maps of 1024 entries through the sheet's own colour.
// Must not know canvases, stores, or themes beyond the colour it is given.

export const MAP_ENTRIES = 1024;

/** Packed pixels as ImageData wants them on a little-endian machine (0xAABBGGRR). */
export type ColourMap = Uint32Array<ArrayBuffer>;

type Lab = readonly [L: number, a: number, b: number];
export type Rgb = readonly [r: number, g: number, b: number];

export type Theme = 'light' | 'dark';

// Tips in OKLCh (Ottosson 2020): both arms of a map end at one lightness and one chroma, so equal field strengths of
// either sign stand off equally from the sheet. Blue against orange stays apart in all three kinds of dichromacy.
const TIPS: Record<Theme, { negative: readonly [number, number, number]; positive: readonly [number, number, number] }> = {
  light: { negative: [0.53, 0.13, 256], positive: [0.57, 0.14, 50] },
  dark: { negative: [0.74, 0.13, 254], positive: [0.79, 0.13, 64] },
};

const SEQUENCE: Record<Theme, readonly (readonly [number, number, number])[]> = {
  light: [
    [0.86, 0.07, 185],
    [0.64, 0.1, 215],
    [0.45, 0.13, 265],
    [0.27, 0.1, 292],
  ],
  dark: [
    [0.32, 0.1, 285],
    [0.5, 0.12, 262],
    [0.7, 0.11, 205],
    [0.95, 0.06, 160],
  ],
};

/** Negative values blue, zero the sheet itself, positive orange; entry 0 is -1, the last is +1. */
export function makeDivergingMap(sheet: Rgb, theme: Theme): ColourMap {
  const middle = labFromRgb(sheet);
  const { negative, positive } = TIPS[theme];
  return mapThrough([labFromLch(negative), middle, labFromLch(positive)], true);
}

/** For magnitudes in dB: entry 0 is the sheet (nothing), the last the strongest. */
export function makeSequentialMap(sheet: Rgb, theme: Theme): ColourMap {
  return mapThrough([labFromRgb(sheet), ...SEQUENCE[theme].map(labFromLch)], false);
}

/** CSS colour of one entry, for scale bars. */
export function cssOfEntry(map: ColourMap, entry: number): string {
  const pixel = map[entry] ?? 0;
  return `rgb(${pixel & 255} ${(pixel >> 8) & 255} ${(pixel >> 16) & 255})`;
}

/** "#rgb" or "#rrggbb" or "rgb(r g b)" into channels of 0..255. */
export function parseColour(text: string): Rgb {
  const hex = text.trim().replace(/^#/, '');
  if (/^[0-9a-f]{3}$/i.test(hex)) return [0, 1, 2].map((k) => parseInt(hex.charAt(k).repeat(2), 16)) as unknown as Rgb;
  if (/^[0-9a-f]{6}/i.test(hex)) return [0, 2, 4].map((k) => parseInt(hex.slice(k, k + 2), 16)) as unknown as Rgb;
  const numbers = text.match(/[\d.]+/g)?.map(Number) ?? [];
  const [r, g, b] = numbers;
  if (r === undefined || g === undefined || b === undefined) throw new Error(`"${text}" is not a colour; write it as #rrggbb`);
  return [r, g, b];
}

/**
 * Straight lines in OKLab from stop to stop. A diverging map keeps its middle in the middle; otherwise entries are
 * spread evenly over the path's length, so that equal steps look equal.
 */
function mapThrough(stops: readonly Lab[], keepMiddle: boolean): ColourMap {
  const legs = stops.slice(1).map((to, k) => ({ from: stops[k] ?? to, to, length: distance(stops[k] ?? to, to) }));
  const total = keepMiddle ? legs.length : legs.reduce((sum, leg) => sum + leg.length, 0);
  const map = new Uint32Array(MAP_ENTRIES);
  for (let entry = 0; entry < MAP_ENTRIES; entry++) {
    let along = (entry / (MAP_ENTRIES - 1)) * total;
    let k = 0;
    const lengthOf = (index: number): number => (keepMiddle ? 1 : (legs[index]?.length ?? 1));
    while (k < legs.length - 1 && along > lengthOf(k)) along -= lengthOf(k++);
    const leg = legs[k];
    if (leg !== undefined) map[entry] = packRgb(rgbFromLab(mix(leg.from, leg.to, Math.min(1, along / lengthOf(k)))));
  }
  return map;
}

function mix(from: Lab, to: Lab, t: number): Lab {
  return [from[0] + (to[0] - from[0]) * t, from[1] + (to[1] - from[1]) * t, from[2] + (to[2] - from[2]) * t];
}

function distance(p: Lab, q: Lab): number {
  return Math.hypot(p[0] - q[0], p[1] - q[1], p[2] - q[2]);
}

function packRgb([r, g, b]: Rgb): number {
  const byte = (v: number): number => Math.min(255, Math.max(0, Math.round(v)));
  return ((255 << 24) | (byte(b) << 16) | (byte(g) << 8) | byte(r)) >>> 0;
}

function labFromLch([L, chroma, hueDegrees]: readonly [number, number, number]): Lab {
  const hue = (hueDegrees * Math.PI) / 180;
  return [L, chroma * Math.cos(hue), chroma * Math.sin(hue)];
}

/** sRGB (IEC 61966-2-1) to OKLab (B. Ottosson, "A perceptual color space for image processing", 2020). */
export function labFromRgb(rgb: Rgb): Lab {
  const [r, g, b] = rgb.map((v) => (v / 255 <= 0.04045 ? v / 255 / 12.92 : ((v / 255 + 0.055) / 1.055) ** 2.4)) as unknown as Rgb;
  const l = Math.cbrt(0.4122214708 * r + 0.5363325363 * g + 0.0514459929 * b);
  const m = Math.cbrt(0.2119034982 * r + 0.6806995451 * g + 0.1073969566 * b);
  const s = Math.cbrt(0.0883024619 * r + 0.2817188376 * g + 0.6299787005 * b);
  return [
    0.2104542553 * l + 0.793617785 * m - 0.0040720468 * s,
    1.9779984951 * l - 2.428592205 * m + 0.4505937099 * s,
    0.0259040371 * l + 0.7827717662 * m - 0.808675766 * s,
  ];
}

export function rgbFromLab([L, a, b]: Lab): Rgb {
  const l = (L + 0.3963377774 * a + 0.2158037573 * b) ** 3;
  const m = (L - 0.1055613458 * a - 0.0638541728 * b) ** 3;
  const s = (L - 0.0894841775 * a - 1.291485548 * b) ** 3;
  const linear = [
    4.0767416621 * l - 3.3077115913 * m + 0.2309699292 * s,
    -1.2684380046 * l + 2.6097574011 * m - 0.3413193965 * s,
    -0.0041960863 * l - 0.7034186147 * m + 1.707614701 * s,
  ];
  const encode = (v: number): number => 255 * (v <= 0.0031308 ? 12.92 * v : 1.055 * v ** (1 / 2.4) - 0.055);
  return linear.map(encode) as unknown as Rgb;
}
