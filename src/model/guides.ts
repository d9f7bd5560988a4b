// Owns the standard rectangular guides, copied with their provenance word for word.
// Must not know jobs.
import { C0 } from '../base/constants.ts';

/** Inner sizes in mm and band in GHz, as published. */
interface GuideRow {
  readonly iec: string;
  readonly eia: string;
  readonly a: number;
  readonly b: number;
  readonly bandGHz: readonly [number, number];
  readonly source: string;
}

// IEC 60153-2 (R numbers), EIA (WR numbers): inner sizes in mm, TE10 cutoff c/2a, usual EIA band

const SOURCE_A = 'sizes, band and cutoff seen in a public selection chart';
const SOURCE_B = 'from memory';

const ROWS: readonly GuideRow[] = [
  { iec: 'R 9', eia: 'WR-975', a: 247.65, b: 123.825, bandGHz: [0.75, 1.12], source: SOURCE_A },
  { iec: 'R 12', eia: 'WR-770', a: 195.58, b: 97.79, bandGHz: [0.96, 1.45], source: SOURCE_A },
  { iec: 'R 14', eia: 'WR-650', a: 165.1, b: 82.55, bandGHz: [1.12, 1.7], source: SOURCE_A },
  { iec: 'R 18', eia: 'WR-510', a: 129.54, b: 64.77, bandGHz: [1.45, 2.2], source: SOURCE_A },
  { iec: 'R 22', eia: 'WR-430', a: 109.22, b: 54.61, bandGHz: [1.7, 2.6], source: SOURCE_A },
  { iec: 'R 26', eia: 'WR-340', a: 86.36, b: 43.18, bandGHz: [2.2, 3.3], source: SOURCE_A },
  { iec: 'R 32', eia: 'WR-284', a: 72.136, b: 34.036, bandGHz: [2.6, 3.95], source: SOURCE_A },
  { iec: 'R 40', eia: 'WR-229', a: 58.166, b: 29.083, bandGHz: [3.3, 4.9], source: SOURCE_A },
  { iec: 'R 48', eia: 'WR-187', a: 47.5488, b: 22.1488, bandGHz: [3.95, 5.85], source: SOURCE_A },
  { iec: 'R 58', eia: 'WR-159', a: 40.386, b: 20.193, bandGHz: [4.9, 7.05], source: SOURCE_A },
  { iec: 'R 70', eia: 'WR-137', a: 34.8488, b: 15.7988, bandGHz: [5.85, 8.2], source: SOURCE_A },
  { iec: 'R 84', eia: 'WR-112', a: 28.4988, b: 12.6238, bandGHz: [7.05, 10], source: SOURCE_A },
  { iec: 'R 100', eia: 'WR-90', a: 22.86, b: 10.16, bandGHz: [8.2, 12.4], source: SOURCE_A },
  { iec: 'R 120', eia: 'WR-75', a: 19.05, b: 9.525, bandGHz: [10, 15], source: SOURCE_A },
  { iec: 'R 140', eia: 'WR-62', a: 15.7988, b: 7.8994, bandGHz: [12.4, 18], source: SOURCE_A },
  { iec: 'R 180', eia: 'WR-51', a: 12.954, b: 6.477, bandGHz: [15, 22], source: SOURCE_A },
  { iec: 'R 220', eia: 'WR-42', a: 10.668, b: 4.318, bandGHz: [18, 26.5], source: SOURCE_B },
  { iec: 'R 260', eia: 'WR-34', a: 8.636, b: 4.318, bandGHz: [22, 33], source: SOURCE_B },
  { iec: 'R 320', eia: 'WR-28', a: 7.112, b: 3.556, bandGHz: [26.5, 40], source: SOURCE_B },
  { iec: 'R 400', eia: 'WR-22', a: 5.6896, b: 2.8448, bandGHz: [33, 50], source: SOURCE_B },
  { iec: 'R 500', eia: 'WR-19', a: 4.7752, b: 2.3876, bandGHz: [40, 60], source: SOURCE_B },
  { iec: 'R 620', eia: 'WR-15', a: 3.7592, b: 1.8796, bandGHz: [50, 75], source: SOURCE_B },
  { iec: 'R 740', eia: 'WR-12', a: 3.0988, b: 1.5494, bandGHz: [60, 90], source: SOURCE_B },
  { iec: 'R 900', eia: 'WR-10', a: 2.54, b: 1.27, bandGHz: [75, 110], source: SOURCE_B },
];

export interface RectangularGuide {
  /** IEC 60153-2 */
  readonly iec: string;
  readonly eia: string;
  /** Inner width and height. */
  readonly aMetres: number;
  readonly bMetres: number;
  /** Usual EIA band. */
  readonly bandHertz: readonly [fromHertz: number, toHertz: number];
  /** TE10, c/2a. */
  readonly cutoffHertz: number;
  readonly source: string;
}

export const GUIDES: readonly RectangularGuide[] = ROWS.map(({ iec, eia, a, b, bandGHz, source }) => ({
  iec,
  eia,
  aMetres: a / 1000,
  bMetres: b / 1000,
  bandHertz: [bandGHz[0] * 1e9, bandGHz[1] * 1e9],
  cutoffHertz: (C0 / (2 * a)) * 1000,
  source,
}));

/** By either name, however spaced: "R 100", "R100", "WR-90". */
export function findGuide(name: string): RectangularGuide | undefined {
  const plain = (text: string): string => text.replaceAll(/[\s-]/g, '').toUpperCase();
  return GUIDES.find((guide) => plain(guide.iec) === plain(name) || plain(guide.eia) === plain(name));
}
