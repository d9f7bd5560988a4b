// Owns how a probe reads: which unknowns, with which weights, give the physical fields at a point.
// Must not know time: the half-step alignment is made in workers/run.ts.
import { intervalAt } from '../base/interval-at.ts';
import type { XY } from '../model/job.ts';
import type { Axis, Grid } from './grid.ts';
import { kernelScales } from './coefficients.ts';
import type { TapTerm } from './row-program.ts';

/** Channel 3 p + 0, 1, 2 of probe p: the out-of-plane field, then the in-plane x and y components, V/m or A/m. */
export function makeProbeTaps(grid: Grid, at: XY, originMetres: XY, probe: number): TapTerm[] {
  const px = at[0] + originMetres[0];
  const py = at[1] + originMetres[1];
  const { uScale, vScale } = kernelScales(grid);
  const sign = grid.section === 'E out of plane' ? 1 : -1;
  const { x, y } = grid;
  const taps: TapTerm[] = [];
  const cross = (
    field: TapTerm['field'],
    columns: readonly Share[],
    rows: readonly Share[],
    component: number,
    weight: (i: number, j: number) => number,
  ): void => {
    for (const [j, wj] of rows) {
      for (const [i, wi] of columns) {
        taps.push({ field, row: j, i, channel: 3 * probe + component, weight: wi * wj * weight(i, j) });
      }
    }
  };
  cross('u', nodeShares(x, px), nodeShares(y, py), 0, () => 1 / uScale);
  cross('vx', nodeShares(x, px), linkShares(y, py), 1, (i) => sign / (vScale * x.width[i]!));
  cross('vy', linkShares(x, px), nodeShares(y, py), 2, (_, j) => sign / (vScale * y.width[j]!));
  return taps;
}

type Share = readonly [index: number, weight: number];

/** Straight-line interpolation between unknowns; towards a wall on which u vanishes it falls to zero there. */
export function nodeShares(axis: Axis, at: number): Share[] {
  const last = axis.count - 1;
  if (at <= axis.position[0]!) return edgeShare(axis, 0, 0, axis.position[0]! - at);
  if (at >= axis.position[last]!) return edgeShare(axis, last, last + 1, at - axis.position[last]!);
  return between(axis.position, at);
}

function edgeShare(axis: Axis, node: number, link: number, distance: number): Share[] {
  if (axis.repeats) {
    const other = node === 0 ? axis.count - 1 : 0;
    const part = distance / axis.linkLength[link]!;
    return [
      [node, 1 - part],
      [other, part],
    ];
  }
  // An open end link joins u to a zero beyond it; a closed one leaves the field even across the wall.
  return [[node, axis.linkOpen[link] === 1 ? 1 - distance / axis.linkLength[link]! : 1]];
}

/** Interpolation between links; beyond the outermost one its value is taken. */
function linkShares(axis: Axis, at: number): Share[] {
  const last = axis.count;
  if (at <= axis.linkPosition[0]!) return [[0, 1]];
  if (at >= axis.linkPosition[last]!) return [[last, 1]];
  return between(axis.linkPosition, at);
}

function between(positions: Float64Array, at: number): Share[] {
  const low = intervalAt(positions, at);
  const high = low + 1;
  const part = (at - positions[low]!) / (positions[high]! - positions[low]!);
  return part < 1e-9
    ? [[low, 1]]
    : part > 1 - 1e-9
      ? [[high, 1]]
      : [
          [low, 1 - part],
          [high, part],
        ];
}
