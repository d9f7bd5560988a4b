// Owns turning a frame of field values into pixels, and the scale that follows the field.
// Must not know the DOM, stores, or where the picture is drawn.
import type { FieldFrame, FieldView } from '../../../workers/protocol.ts';
import { parseQuantity } from '../../base/quantity.ts';
import { MAP_ENTRIES, type ColourMap } from './colour-map.ts';

/** log2 of a positive float32 from its upper 16 bits, 8 of exponent and 7 of mantissa: good to 0.04 dB. */
const LOG2_OF_UPPER_BITS = makeLog2Table();

const DECIBELS_PER_OCTAVE = 20 * Math.log10(2);

export function isMagnitude(view: FieldView): boolean {
  return view === '|E|' || view === '|H|';
}

/** Unit of what is shown. */
export function unitOf(view: FieldView): 'V/m' | 'A/m' {
  return view.includes('E') ? 'V/m' : 'A/m';
}

/** A typed scale in V/m or A/m, above zero; null (empty) for automatic. */
export function readScale(text: string, field: FieldView): number | null | 'wrong' {
  const trimmed = text.trim();
  if (trimmed === '' || trimmed === 'auto') return null;
  const bare = Number(trimmed);
  if (Number.isFinite(bare)) return bare > 0 ? bare : 'wrong';
  const magnetic = unitOf(field) === 'A/m';
  const read = magnetic ? parseQuantity(trimmed.replace(/\/m$/, ''), 'current') : parseQuantity(trimmed, 'field');
  return read.ok && read.value > 0 ? read.value : 'wrong';
}

/**
 * Writes a frame into `pixels` (width * height packed pixels, top row first); the frame's rows come bottom first.
 * `fullScale` in the frame's unit takes the last colour.
 */
export function paintComponentInto(pixels: Uint32Array, frame: FieldFrame, map: ColourMap, fullScale: number): void {
  const { width, height, values } = frame;
  const last = MAP_ENTRIES - 1;
  const middle = last / 2;
  const gain = fullScale > 0 ? middle / fullScale : 0;
  for (let row = 0; row < height; row++) {
    let from = row * width;
    const end = from + width;
    let to = (height - 1 - row) * width;
    for (; from < end; from++, to++) {
      const entry = (middle + (values[from] as number) * gain + 0.5) | 0;
      pixels[to] = map[entry < 0 ? 0 : entry > last ? last : entry] as number;
    }
  }
}

/**
 * As above for magnitudes: `fullScale` is 0 dB, `spanDb` below it is the sheet's own colour. The colour is looked up by
 * the upper bits of the float: one look-up a pixel, where a logarithm took six times as long.
 */
export function paintDecibelsInto(
  pixels: Uint32Array,
  frame: FieldFrame,
  map: ColourMap,
  fullScale: number,
  spanDb: number,
): void {
  const { width, height, values } = frame;
  const bits = new Uint32Array(values.buffer, values.byteOffset, values.length);
  const colours = colourByUpperBits(map, fullScale, spanDb);
  for (let row = 0; row < height; row++) {
    let from = row * width;
    const end = from + width;
    let to = (height - 1 - row) * width;
    for (; from < end; from++, to++) pixels[to] = colours[((bits[from] as number) >>> 16) & 0x7fff] as number;
  }
}

function colourByUpperBits(map: ColourMap, fullScale: number, spanDb: number): Uint32Array {
  const last = MAP_ENTRIES - 1;
  const gain = (last * DECIBELS_PER_OCTAVE) / spanDb;
  const shift = last - gain * Math.log2(fullScale > 0 ? fullScale : 1) + 0.5;
  return Uint32Array.from(
    LOG2_OF_UPPER_BITS,
    (log2) => map[Math.min(last, Math.max(0, Math.floor(shift + gain * log2)))] as number,
  );
}

const SAMPLES = 3000;

/**
 * The level that full colour should show: just above what 99 in 100 of the cells reach. Next to a line current or an
 * edge of metal the field rises without bound; following that one cell would leave the rest of the sheet blank.
 */
export function strongLevel(frame: FieldFrame): number {
  const { values } = frame;
  // An odd stride, so that samples do not line up in columns.
  const stride = Math.max(1, Math.floor(values.length / SAMPLES)) | 1;
  const sample: number[] = [];
  for (let p = 0; p < values.length; p += stride) sample.push(Math.abs(values[p] as number));
  sample.sort((a, b) => a - b);
  const high = sample[Math.floor(0.99 * (sample.length - 1))] ?? 0;
  return Number.isFinite(frame.peak) ? Math.min(frame.peak, Math.max(1.15 * high, 0.2 * frame.peak)) : high;
}

/** The scale that follows the field rises quickly and sinks slowly, so that colours do not flicker. */
export function followLevel(previous: number, level: number): number {
  return level >= previous ? previous + 0.5 * (level - previous) : Math.max(level, previous * 0.96);
}

function makeLog2Table(): Float32Array {
  const table = new Float32Array(32768);
  const word = new Uint32Array(1);
  const float = new Float32Array(word.buffer);
  for (let upper = 0; upper < table.length; upper++) {
    word[0] = (upper << 16) | 0x8000;
    const value = float[0] as number;
    table[upper] = value > 0 ? Math.max(-1000, Math.log2(value)) : -1000;
  }
  return table;
}
