// Owns the media seen by each unknown: means over the boxes of u and of the links, from exact area fractions.
// Must not know rows, absorbers or the memory image.
// Source: A. Farjadpour et al., Opt. Lett. 31 (2006) 2972, for the anisotropic mean; R. D. Meade et al., Phys. Rev. B 48
// (1993) 8434, for its parts.
import type { Medium, Section } from '../model/job.ts';
import { measureCoverage } from './coverage.ts';
import type { Axis, Grid } from './grid.ts';
import type { Region } from './paint.ts';

/** Relative constants of one unknown: m is eps or mu (as the section has it), s the matching loss in S/m or ohm/m. */
export interface MediaRow {
  /** For u, one entry per unknown of the row. */
  readonly uM: Float64Array;
  readonly uS: Float64Array;
  /** For the links below the row (vx) and to the left (vy, one more entry). */
  readonly xM: Float64Array;
  readonly xS: Float64Array;
  readonly yM: Float64Array;
  readonly yS: Float64Array;
}

export interface MediaRows {
  /** Rows with the same key have the same media. Row `count` is the one that holds only the links above the last u. */
  keyOf(row: number): string;
  rowAt(row: number): MediaRow;
}

/** Which constants act on u and which on v: eps and sigma on the electric quantity of the section. */
export function constantsOf(medium: Medium, section: Section): { uM: number; uS: number; vM: number; vS: number } {
  return section === 'E out of plane'
    ? { uM: medium.epsilonRelative, uS: medium.sigma, vM: medium.muRelative, vS: medium.sigmaMagnetic }
    : { uM: medium.muRelative, uS: medium.sigmaMagnetic, vM: medium.epsilonRelative, vS: medium.sigma };
}

/** Sums over the covered, non-metal part of a row of half cells. */
interface HalfRow {
  /** Fraction that is not metal. */
  readonly open: Float64Array;
  readonly uM: Float64Array;
  readonly uS: Float64Array;
  readonly vM: Float64Array;
  readonly vInverse: Float64Array;
  readonly vS: Float64Array;
  /** Loss over m squared, for the loss of the harmonic mean. */
  readonly vSInverse: Float64Array;
}

/** Half-cell borders of the sheet along an axis, metres from its corner. */
export function halfBorders(axis: Axis): Float64Array {
  const borders = new Float64Array(2 * axis.cells + 1);
  for (let k = 0; k < axis.cells; k++) {
    const a = axis.lines[axis.before + k]!;
    const b = axis.lines[axis.before + k + 1]!;
    borders[2 * k] = a;
    borders[2 * k + 1] = (a + b) / 2;
    borders[2 * k + 2] = b;
  }
  return borders;
}

/** Half cell of the sheet that stands for half cell `k` of the axis: absorbers repeat the medium at the sheet's edge. */
function sheetHalf(axis: Axis, k: number): number {
  return Math.min(2 * axis.cells - 1, Math.max(0, k - 2 * axis.before));
}

export function makeMediaRows(grid: Grid, regions: readonly Region[], background: Medium): MediaRows {
  const { x, y, section } = grid;
  const coverage = measureCoverage(regions, halfBorders(x), halfBorders(y));
  const halfRows = new Map<number, HalfRow>();
  const scratch = new Float64Array(coverage.columnCount);
  const back = constantsOf(background, section);

  const halfRow = (rowClass: number): HalfRow => {
    const found = halfRows.get(rowClass);
    if (found !== undefined) return found;
    const n = coverage.columnCount;
    const row: HalfRow = {
      open: new Float64Array(n).fill(1),
      uM: new Float64Array(n).fill(back.uM),
      uS: new Float64Array(n).fill(back.uS),
      vM: new Float64Array(n).fill(back.vM),
      vInverse: new Float64Array(n).fill(1 / back.vM),
      vS: new Float64Array(n).fill(back.vS),
      vSInverse: new Float64Array(n).fill(back.vS / (back.vM * back.vM)),
    };
    regions.forEach((region, k) => {
      if (rowClass === 0 || !coverage.fractionInto(scratch, rowClass, k)) return;
      const own = constantsOf(region.medium, section);
      for (let c = 0; c < n; c++) {
        const f = scratch[c]!;
        if (f === 0) continue;
        const metal = region.medium.metal;
        if (metal) row.open[c]! -= f;
        row.uM[c]! += f * ((metal ? 0 : own.uM) - back.uM);
        row.uS[c]! += f * ((metal ? 0 : own.uS) - back.uS);
        row.vM[c]! += f * ((metal ? 0 : own.vM) - back.vM);
        row.vInverse[c]! += f * ((metal ? 0 : 1 / own.vM) - 1 / back.vM);
        row.vS[c]! += f * ((metal ? 0 : own.vS) - back.vS);
        row.vSInverse[c]! += f * ((metal ? 0 : own.vS / (own.vM * own.vM)) - back.vS / (back.vM * back.vM));
      }
    });
    halfRows.set(rowClass, row);
    return row;
  };

  const classesOf = (row: number): [uLow: number, uHigh: number, linkLow: number, linkHigh: number] => {
    const u = Math.min(row, y.count - 1);
    const at = (half: number): number => coverage.classOfRow[sheetHalf(y, half)]!;
    return [at(y.box[2 * u]!), at(y.box[2 * u + 1]!), at(y.linkBox[2 * row]!), at(y.linkBox[2 * row + 1]!)];
  };

  return {
    keyOf: (row) => classesOf(row).join(),
    rowAt(row) {
      const classes = classesOf(row);
      return makeMediaRow(x, halfRow(classes[0]), halfRow(classes[1]), halfRow(classes[2]), halfRow(classes[3]), back);
    },
  };
}

interface Constants {
  readonly uM: number;
  readonly uS: number;
  readonly vM: number;
  readonly vS: number;
}

function makeMediaRow(x: Axis, uLow: HalfRow, uHigh: HalfRow, linkLow: HalfRow, linkHigh: HalfRow, back: Constants): MediaRow {
  const n = x.count;
  const row: MediaRow = {
    uM: new Float64Array(n).fill(back.uM),
    uS: new Float64Array(n).fill(back.uS),
    xM: new Float64Array(n).fill(back.vM),
    xS: new Float64Array(n).fill(back.vS),
    yM: new Float64Array(n + 1).fill(back.vM),
    yS: new Float64Array(n + 1).fill(back.vS),
  };
  const pair: [number, number] = [0, 0];
  for (let i = 0; i < n; i++) {
    const p = sheetHalf(x, x.box[2 * i]!);
    const q = sheetHalf(x, x.box[2 * i + 1]!);
    const open = uLow.open[p]! + uLow.open[q]! + uHigh.open[p]! + uHigh.open[q]!;
    if (open > 1e-9) {
      row.uM[i] = (uLow.uM[p]! + uLow.uM[q]! + uHigh.uM[p]! + uHigh.uM[q]!) / open;
      row.uS[i] = (uLow.uS[p]! + uLow.uS[q]! + uHigh.uS[p]! + uHigh.uS[q]!) / open;
    }
    if (linkMean(linkLow, linkHigh, p, q, 'x', pair)) {
      row.xM[i] = pair[0];
      row.xS[i] = pair[1];
    }
  }
  for (let i = 0; i <= n; i++) {
    if (linkMean(uLow, uHigh, sheetHalf(x, x.linkBox[2 * i]!), sheetHalf(x, x.linkBox[2 * i + 1]!), 'y', pair)) {
      row.yM[i] = pair[0];
      row.yS[i] = pair[1];
    }
  }
  return row;
}

/**
 * Mean seen by the in-plane component along `along`, over four half cells: harmonic by the share of the interface normal
 * along it, arithmetic by the rest. Loss is carried to first order. False where all four are metal.
 */
function linkMean(low: HalfRow, high: HalfRow, p: number, q: number, along: 'x' | 'y', out: [number, number]): boolean {
  const openLeft = low.open[p]! + high.open[p]!;
  const openRight = low.open[q]! + high.open[q]!;
  const open = openLeft + openRight;
  if (open <= 1e-9) return false;
  const mean = (low.vM[p]! + low.vM[q]! + high.vM[p]! + high.vM[q]!) / open;
  const inverse = (low.vInverse[p]! + low.vInverse[q]! + high.vInverse[p]! + high.vInverse[q]!) / open;
  const loss = (low.vS[p]! + low.vS[q]! + high.vS[p]! + high.vS[q]!) / open;
  if (mean * inverse - 1 < 1e-12) {
    out[0] = mean;
    out[1] = loss;
    return true;
  }
  const lossInverse = (low.vSInverse[p]! + low.vSInverse[q]! + high.vSInverse[p]! + high.vSInverse[q]!) / open;
  const openLow = low.open[p]! + low.open[q]!;
  const openHigh = high.open[p]! + high.open[q]!;
  const side = (sum: number, share: number): number => (share > 1e-9 ? sum / share : mean);
  const gx = side(low.vM[q]! + high.vM[q]!, openRight) - side(low.vM[p]! + high.vM[p]!, openLeft);
  const gy = side(high.vM[p]! + high.vM[q]!, openHigh) - side(low.vM[p]! + low.vM[q]!, openLow);
  const along2 = along === 'x' ? gx * gx : gy * gy;
  const total = gx * gx + gy * gy;
  // A box split with no gradient (a thin layer through its middle) has no normal to speak of: take the mean of both.
  const normal = total > 1e-12 * mean * mean ? along2 / total : 0.5;
  const m = 1 / (normal * inverse + (1 - normal) / mean);
  out[0] = m;
  out[1] = m * m * (normal * lossInverse + ((1 - normal) * loss) / (mean * mean));
  return true;
}
