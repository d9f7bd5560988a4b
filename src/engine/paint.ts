// Owns what is visible of the parts once they are painted over each other: disjoint regions, one per medium.
// Must not know grids or coefficients.
import { intersect, subtract, unite, type WholePaths } from '../base/clip-paths.ts';
import type { Medium, Outline, ResolvedPart, XY } from '../model/job.ts';

/** Rings in metres from the sheet's lower left corner, inside the sheet; areas by the nonzero rule. */
export interface Region {
  readonly medium: Medium;
  readonly rings: readonly (readonly XY[])[];
}

/** The clipper works in whole numbers: this many steps along the longer side, 0.1 nm on a sheet of 400 mm. */
const STEPS = 2 ** 32;

interface Sized {
  readonly widthMetres: number;
  readonly heightMetres: number;
  readonly originMetres: XY;
}

/**
 * Later parts cover earlier ones. Each region is clipped to the sheet, so what runs off it ends at the edge (the absorber
 * repeats the medium of the edge). Regions of equal media are joined in one entry.
 */
export function paintParts(parts: readonly ResolvedPart[], sheet: Sized): Region[] {
  const unit = Math.max(sheet.widthMetres, sheet.heightMetres) / STEPS;
  const board: WholePaths = [rectangle(0, 0, Math.round(sheet.widthMetres / unit), Math.round(sheet.heightMetres / unit))];
  const byMedium = new Map<string, { medium: Medium; rings: XY[][] }>();
  let covered: WholePaths = [];
  for (let k = parts.length - 1; k >= 0; k--) {
    const part = parts[k]!;
    const drawn = intersect(toSteps(part.outline, sheet.originMetres, unit), board);
    if (drawn.length === 0) continue;
    const visible = covered.length === 0 ? drawn : subtract(drawn, covered);
    if (k > 0) covered = covered.length === 0 ? drawn : unite(covered, drawn);
    if (visible.length === 0) continue;
    const key = part.medium.metal ? 'metal' : JSON.stringify(part.medium);
    const region = byMedium.get(key) ?? { medium: part.medium, rings: [] };
    for (const path of visible) region.rings.push(path.map((p): XY => [p.x * unit, p.y * unit]));
    byMedium.set(key, region);
  }
  return [...byMedium.values()];
}

function rectangle(left: number, bottom: number, right: number, top: number) {
  return [
    { x: left, y: bottom },
    { x: right, y: bottom },
    { x: right, y: top },
    { x: left, y: top },
  ];
}

function toSteps(outline: Outline, origin: XY, unit: number): WholePaths {
  return outline.map((ring) =>
    ring.map(([x, y]) => ({ x: Math.round((x + origin[0]) / unit), y: Math.round((y + origin[1]) / unit) })),
  );
}
