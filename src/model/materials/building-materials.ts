// Owns the building materials of Recommendation ITU-R P.2040, Table 3, copied with their provenance word for word.
// Must not know how the law is evaluated.

/** eps_r = a f^b, sigma = c f^d in S/m, f in GHz, valid within `fGHz`. */
export interface BuildingMaterialRow {
  readonly name: string;
  readonly recommendation: string;
  readonly a: number;
  readonly b: number;
  readonly c: number;
  readonly d: number;
  readonly fGHz: readonly [number, number];
  readonly source: string;
}

// Recommendation ITU-R P.2040 (effects of building materials), Table 3

const SOURCE_A =
  'from memory, then matched digit by digit with several public listings of Rec. ITU-R P.2040-2/-3, Table 3; the document itself was not read';
const SOURCE_B = 'from memory; matched at 9 GHz with a public listing of P.2040-1 values';

export const BUILDING_MATERIALS: readonly BuildingMaterialRow[] = [
  { name: 'vacuum', recommendation: 'P.2040-3', a: 1, b: 0, c: 0, d: 0, fGHz: [0.001, 100], source: SOURCE_A },
  { name: 'concrete', recommendation: 'P.2040-3', a: 5.24, b: 0, c: 0.0462, d: 0.7822, fGHz: [1, 100], source: SOURCE_A },
  { name: 'brick', recommendation: 'P.2040-3', a: 3.91, b: 0, c: 0.0238, d: 0.16, fGHz: [1, 40], source: SOURCE_A },
  { name: 'plasterboard', recommendation: 'P.2040-3', a: 2.73, b: 0, c: 0.0085, d: 0.9395, fGHz: [1, 100], source: SOURCE_A },
  { name: 'wood', recommendation: 'P.2040-3', a: 1.99, b: 0, c: 0.0047, d: 1.0718, fGHz: [0.001, 100], source: SOURCE_A },
  { name: 'glass', recommendation: 'P.2040-3', a: 6.31, b: 0, c: 0.0036, d: 1.3394, fGHz: [0.1, 100], source: SOURCE_A },
  { name: 'glass-mmw', recommendation: 'P.2040-3', a: 5.79, b: 0, c: 0.0004, d: 1.658, fGHz: [220, 450], source: SOURCE_A },
  { name: 'ceiling board', recommendation: 'P.2040-3', a: 1.48, b: 0, c: 0.0011, d: 1.075, fGHz: [1, 100], source: SOURCE_A },
  {
    name: 'ceiling board-mmw',
    recommendation: 'P.2040-3',
    a: 1.52,
    b: 0,
    c: 0.0029,
    d: 1.029,
    fGHz: [220, 450],
    source: SOURCE_A,
  },
  { name: 'chipboard', recommendation: 'P.2040-3', a: 2.58, b: 0, c: 0.0217, d: 0.78, fGHz: [1, 100], source: SOURCE_A },
  { name: 'plywood', recommendation: 'P.2040-3', a: 2.71, b: 0, c: 0.33, d: 0, fGHz: [1, 40], source: SOURCE_A },
  { name: 'marble', recommendation: 'P.2040-3', a: 7.074, b: 0, c: 0.0055, d: 0.9262, fGHz: [1, 60], source: SOURCE_A },
  { name: 'floorboard', recommendation: 'P.2040-3', a: 3.66, b: 0, c: 0.0044, d: 1.3515, fGHz: [50, 100], source: SOURCE_A },
  { name: 'metal', recommendation: 'P.2040-3', a: 1, b: 0, c: 10000000, d: 0, fGHz: [1, 100], source: SOURCE_A },
  { name: 'very dry ground', recommendation: 'P.2040-3', a: 3, b: 0, c: 0.00015, d: 2.52, fGHz: [1, 10], source: SOURCE_A },
  { name: 'medium dry ground', recommendation: 'P.2040-3', a: 15, b: -0.1, c: 0.035, d: 1.63, fGHz: [1, 10], source: SOURCE_A },
  { name: 'wet ground', recommendation: 'P.2040-3', a: 30, b: -0.4, c: 0.15, d: 1.3, fGHz: [1, 10], source: SOURCE_A },
  { name: 'concrete', recommendation: 'P.2040-1', a: 5.31, b: 0, c: 0.0326, d: 0.8095, fGHz: [1, 100], source: SOURCE_B },
  { name: 'brick', recommendation: 'P.2040-1', a: 3.75, b: 0, c: 0.038, d: 0, fGHz: [1, 10], source: SOURCE_B },
  { name: 'plasterboard', recommendation: 'P.2040-1', a: 2.94, b: 0, c: 0.0116, d: 0.7076, fGHz: [1, 100], source: SOURCE_B },
  { name: 'wood', recommendation: 'P.2040-1', a: 1.99, b: 0, c: 0.0047, d: 1.0718, fGHz: [0.001, 100], source: SOURCE_B },
  { name: 'glass', recommendation: 'P.2040-1', a: 6.27, b: 0, c: 0.0043, d: 1.1925, fGHz: [0.1, 100], source: SOURCE_B },
  { name: 'ceiling board', recommendation: 'P.2040-1', a: 1.5, b: 0, c: 0.0005, d: 1.1634, fGHz: [1, 100], source: SOURCE_B },
  { name: 'chipboard', recommendation: 'P.2040-1', a: 2.58, b: 0, c: 0.0217, d: 0.78, fGHz: [1, 100], source: SOURCE_B },
  { name: 'floorboard', recommendation: 'P.2040-1', a: 3.66, b: 0, c: 0.0044, d: 1.3515, fGHz: [50, 100], source: SOURCE_B },
  { name: 'metal', recommendation: 'P.2040-1', a: 1, b: 0, c: 10000000, d: 0, fGHz: [1, 100], source: SOURCE_B },
];
