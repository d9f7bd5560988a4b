// Owns the six coefficients of every cell of a row: media, spacing, absorber stretch, metal and walls folded into a and b.
// Must not know spans, drives or the memory image. Equations 1 to 6 of README.md.
import { C0, ETA0 } from '../base/constants.ts';
import type { Medium } from '../model/job.ts';
import type { AbsorberProfile } from './absorber.ts';
import { makeAbsorber } from './absorber.ts';
import type { Grid } from './grid.ts';
import { refractiveIndex } from './grid.ts';
import { makeMediaRows } from './media.ts';
import { markMetal } from './metal.ts';
import type { Region } from './paint.ts';

/** One row: count + 1 columns (the last holds only the link to the right edge). Float32, as the kernel takes them. */
export interface CoefficientRow {
  readonly au: Float32Array;
  readonly bu: Float32Array;
  readonly avx: Float32Array;
  readonly bvx: Float32Array;
  readonly avy: Float32Array;
  readonly bvy: Float32Array;
  /** The link shared by repeating left and right edges: [a, b], else null. */
  readonly wrap: readonly [a: number, b: number] | null;
}

export interface Coefficients {
  /** Rows 0 to y.count; the last holds only the links to the top edge. Equal keys mean equal rows. */
  keyOf(row: number): string;
  rowAt(row: number): CoefficientRow;
  readonly absorbX: { readonly u: AbsorberProfile; readonly link: AbsorberProfile };
  readonly absorbY: { readonly u: AbsorberProfile; readonly link: AbsorberProfile };
  /** Kernel v per physical in-plane field times cell side: v = field x side x scale. Kernel u = physical x uScale. */
  readonly uScale: number;
  readonly vScale: number;
}

/**
 * Scales by which the links of an empty sheet of square cells get b = 1, so that the kernel need not multiply there; u and v
 * of a travelling wave stay of one size, so that single precision is used evenly. `pace` is c0 dt in metres.
 */
export function kernelScales(grid: Grid): { uScale: number; vScale: number; pace: number } {
  const eOut = grid.section === 'E out of plane';
  const pace = C0 * grid.dtSeconds;
  return { uScale: eOut ? 1 : ETA0, vScale: (eOut ? ETA0 : 1) / pace, pace };
}

export function makeCoefficients(
  grid: Grid,
  regions: readonly Region[],
  background: Medium,
  band: { fromHertz: number; toHertz: number },
): Coefficients {
  const { x, y } = grid;
  const media = makeMediaRows(grid, regions, background);
  const metal = markMetal(grid, regions);
  const index = refractiveIndex(background, band.fromHertz);
  const absorbX = makeAbsorber(x, grid.dtSeconds, index, band);
  const absorbY = makeAbsorber(y, grid.dtSeconds, index, band);
  const { uScale, vScale, pace } = kernelScales(grid);
  const metalClasses = metal === null ? null : classifyRows(metal, x.count, y.count);
  const lossPer = (grid.dtSeconds * C0) / 2;
  // x = sigma dt / (2 eps) = sigma eta0 c dt / (2 eps_r), and the dual with sigma* / eta0.
  const uLoss = grid.section === 'E out of plane' ? lossPer * ETA0 : lossPer / ETA0;
  const vLoss = grid.section === 'E out of plane' ? lossPer / ETA0 : lossPer * ETA0;

  const keyOf = (row: number): string => {
    const u = row < y.count;
    return [
      media.keyOf(row),
      u ? y.width[row]! * absorbY.u.kappa[row]! : 0,
      y.linkLength[row]! * absorbY.link.kappa[row]!,
      y.linkOpen[row]!,
      row === 0 && y.repeats ? 'wrap' : '',
      metalClasses === null ? '' : metalClasses[row]!,
    ].join('/');
  };

  const rowAt = (row: number): CoefficientRow => {
    const n = x.count + 1;
    const out = {
      au: new Float32Array(n).fill(1),
      bu: new Float32Array(n),
      avx: new Float32Array(n).fill(1),
      bvx: new Float32Array(n),
      avy: new Float32Array(n).fill(1),
      bvy: new Float32Array(n),
    };
    const seen = media.rowAt(row);
    const hasU = row < y.count;
    const sideY = hasU ? y.width[row]! * absorbY.u.kappa[row]! : 0;
    const riseY = y.linkLength[row]! * absorbY.link.kappa[row]!;
    const openX = y.linkOpen[row] === 1 && !(row === 0 && y.repeats);
    for (let i = 0; i < x.count; i++) {
      const sideX = x.width[i]! * absorbX.u.kappa[i]!;
      if (hasU && metal?.uDead[row * x.count + i] !== 1) {
        const loss = (uLoss * seen.uS[i]!) / seen.uM[i]!;
        out.au[i] = (1 - loss) / (1 + loss);
        out.bu[i] = (pace * pace) / (seen.uM[i]! * sideX * sideY * (1 + loss));
      }
      if (openX && metal?.xBlocked[row * x.count + i] !== 1) {
        const loss = (vLoss * seen.xS[i]!) / seen.xM[i]!;
        out.avx[i] = (1 - loss) / (1 + loss);
        out.bvx[i] = sideX / (seen.xM[i]! * riseY * (1 + loss));
      }
    }
    let wrap: [number, number] | null = null;
    for (let i = 0; i <= x.count; i++) {
      if (!hasU || x.linkOpen[i] !== 1 || metal?.yBlocked[row * (x.count + 1) + i] === 1) continue;
      const riseX = x.linkLength[i]! * absorbX.link.kappa[i]!;
      const loss = (vLoss * seen.yS[i]!) / seen.yM[i]!;
      const a = (1 - loss) / (1 + loss);
      const b = sideY / (seen.yM[i]! * riseX * (1 + loss));
      if (x.repeats && (i === 0 || i === x.count)) {
        if (i === 0) wrap = [Math.fround(a), Math.fround(b)];
      } else {
        out.avy[i] = a;
        out.bvy[i] = b;
      }
    }
    return { ...out, wrap };
  };
  return { keyOf, rowAt, absorbX, absorbY, uScale, vScale };
}

/** Gives rows with the same metal the same number. */
function classifyRows(
  masks: { uDead: Uint8Array; xBlocked: Uint8Array; yBlocked: Uint8Array },
  nx: number,
  ny: number,
): Int32Array {
  const known = new Map<string, number>();
  const classes = new Int32Array(ny + 1);
  for (let j = 0; j <= ny; j++) {
    const u = j < ny ? runs(masks.uDead, j * nx, nx) : '';
    const vy = j < ny ? runs(masks.yBlocked, j * (nx + 1), nx + 1) : '';
    const key = `${u};${vy};${runs(masks.xBlocked, j * nx, nx)}`;
    let found = known.get(key);
    if (found === undefined) known.set(key, (found = known.size));
    classes[j] = found;
  }
  return classes;
}

/** Where a byte row changes: a short exact key of its content. */
function runs(bytes: Uint8Array, start: number, length: number): string {
  let key = '';
  let last = 0;
  for (let k = 0; k < length; k++) {
    const value = bytes[start + k]!;
    if (value !== last) {
      key += `${k},`;
      last = value;
    }
  }
  return key;
}
