// Owns the steps of rulers and of the snapping grid, and lengths written as tidy quantities.
// Must not know the DOM, stores, or the viewport.
import type { Quantity } from '../../model/job.ts';

export interface LengthUnit {
  readonly name: string;
  readonly metres: number;
}

const UNITS: readonly LengthUnit[] = [
  { name: 'km', metres: 1e3 },
  { name: 'm', metres: 1 },
  { name: 'mm', metres: 1e-3 },
  { name: 'µm', metres: 1e-6 },
  { name: 'nm', metres: 1e-9 },
];

export interface Ruler {
  /** Distance between labelled ticks, metres. */
  readonly majorMetres: number;
  /** Small ticks between two labelled ones, the labelled one counted. */
  readonly minorPerMajor: number;
  readonly unit: LengthUnit;
}

/** Smallest 1-2-5 step that is at least `least`. */
export function stepAtLeast(least: number): number {
  const decade = 10 ** Math.floor(Math.log10(least));
  const ratio = least / decade;
  // A hair of tolerance: 5e-3 / 1e-3 is 5.000000000000001 in binary.
  const leading = ratio <= 1 + 1e-9 ? 1 : ratio <= 2 + 1e-9 ? 2 : ratio <= 5 + 1e-9 ? 5 : 10;
  return leading * decade;
}

/** The largest unit in which `stepMetres` is a whole number; the trade writes 500 mm, not 0.5 m. */
export function unitForStep(stepMetres: number): LengthUnit {
  return UNITS.find((unit) => stepMetres >= unit.metres * (1 - 1e-9)) ?? { name: 'nm', metres: 1e-9 };
}

export function makeRuler(pixelsPerMetre: number): Ruler {
  const majorMetres = stepAtLeast(72 / pixelsPerMetre);
  const leading = Math.round(majorMetres / 10 ** Math.floor(Math.log10(majorMetres) + 1e-9));
  return { majorMetres, minorPerMajor: leading === 2 ? 4 : 5, unit: unitForStep(majorMetres) };
}

/** Positions of ticks from `from` to `to` in metres; computed by index so that no error piles up. */
export function ticksBetween(ruler: Ruler, from: number, to: number): readonly { at: number; label: string | null }[] {
  const minor = ruler.majorMetres / ruler.minorPerMajor;
  const ticks: { at: number; label: string | null }[] = [];
  for (let n = Math.ceil(from / minor); n <= Math.floor(to / minor); n++) {
    const at = n * minor;
    ticks.push({ at, label: n % ruler.minorPerMajor === 0 ? tickLabel(at, ruler) : null });
  }
  return ticks;
}

function tickLabel(at: number, ruler: Ruler): string {
  const digits = Math.max(0, -Math.floor(Math.log10(ruler.majorMetres / ruler.unit.metres) + 1e-9));
  const text = (Math.abs(at) < ruler.majorMetres / 1e6 ? 0 : at / ruler.unit.metres).toFixed(digits);
  return text.replace('-', '−');
}

/** Step of the snapping grid: decimal, and never finer than a hand can point. */
export function snapStep(pixelsPerMetre: number): number {
  return stepAtLeast(7 / pixelsPerMetre);
}

/** Below this a length is rounding noise, not a length. */
const NOISE_METRES = 1e-13;

/**
 * A length as a person would write it: "220 mm". Positions come from snapping and carry few digits of their own; nine
 * significant ones keep typed values exact and drop the noise of binary sums. Millimetres serve from 1 µm to 10 m.
 */
export function tidyLength(metres: number): Quantity {
  const size = Math.abs(metres);
  if (size < NOISE_METRES) return '0 mm';
  const millimetres = { name: 'mm', metres: 1e-3 };
  const unit = size >= 0.99e-6 && size < 10 ? millimetres : unitForStep(size);
  return `${Number((metres / unit.metres).toPrecision(9))} ${unit.name}`;
}
