// Owns exact area fractions: how much of each half cell of the sheet each region covers.
// Must not know media, coefficients or polarisation.
import { intervalAt } from '../base/interval-at.ts';
import type { Region } from './paint.ts';

/**
 * One row of half cells. For region k, `columns[k]` are the half cells its boundary touches, rising; `area[k]` what the
 * boundary there adds to the covered fraction of that half cell, `carry[k]` what it adds to every half cell to the right.
 */
interface CoverageRow {
  readonly columns: Int32Array[];
  readonly area: Float64Array[];
  readonly carry: Float64Array[];
}

export interface Coverage {
  readonly columnCount: number;
  /** Rows of equal content share a class; class 0 is a row that no region touches. */
  readonly classOfRow: Int32Array;
  /** Writes the covered fraction (0 to 1) of region k over the half cells of a class; `out` has columnCount entries. */
  fractionInto(out: Float64Array, rowClass: number, region: number): boolean;
}

/**
 * Signed-area scan: every edge of a ring is cut at the half cells it crosses and leaves there the area to its right; a
 * running sum gives the fraction. Exact to rounding for polygons. `xs`, `ys` are the borders of the half cells in metres.
 */
export function measureCoverage(regions: readonly Region[], xs: Float64Array, ys: Float64Array): Coverage {
  const columnCount = xs.length - 1;
  const rowCount = ys.length - 1;
  const cells = regions.map(() => new Map<number, Map<number, [area: number, carry: number]>>());
  regions.forEach((region, k) => {
    for (const ring of region.rings) {
      for (let n = 0; n < ring.length; n++) {
        const a = ring[n]!;
        const b = ring[(n + 1) % ring.length]!;
        scanEdge(a[0], a[1], b[0], b[1], xs, ys, cells[k]!);
      }
    }
  });

  const rows: CoverageRow[] = [{ columns: [], area: [], carry: [] }];
  const classOfRow = new Int32Array(rowCount);
  // Rows are told apart first by the half cells they touch, in whole numbers, then by what they hold there.
  const known = new Map<number, number[]>();
  for (let row = 0; row < rowCount; row++) {
    const content = readRow(cells.map((ofRegion) => ofRegion.get(row)));
    if (content === null) continue;
    const place = placeOf(content);
    const alike = known.get(place) ?? [];
    let rowClass = alike.find((one) => isSame(rows[one]!, content));
    if (rowClass === undefined) {
      rowClass = rows.length;
      rows.push(content);
      known.set(place, [...alike, rowClass]);
    }
    classOfRow[row] = rowClass;
  }

  return {
    columnCount,
    classOfRow,
    fractionInto(out, rowClass, region) {
      out.fill(0);
      const columns = rows[rowClass]!.columns[region];
      if (columns === undefined || columns.length === 0) return false;
      const area = rows[rowClass]!.area[region]!;
      const carry = rows[rowClass]!.carry[region]!;
      let running = 0;
      for (let n = 0; n < columns.length; n++) {
        const at = columns[n]!;
        out[at] = clampFraction(running + area[n]!);
        running += carry[n]!;
        const until = n + 1 < columns.length ? columns[n + 1]! : columnCount;
        if (Math.abs(running) > 1e-12) out.fill(clampFraction(running), at + 1, until);
      }
      return true;
    },
  };
}

function clampFraction(value: number): number {
  return value < 0 ? 0 : value > 1 ? 1 : value;
}

/** Null when no region touches the row. */
function readRow(lists: readonly (Map<number, [number, number]> | undefined)[]): CoverageRow | null {
  if (lists.every((list) => list === undefined || list.size === 0)) return null;
  const columns = lists.map((list) => Int32Array.from(list?.keys() ?? []).sort());
  const pick = (which: 0 | 1): Float64Array[] =>
    columns.map((places, k) => Float64Array.from(places, (column) => lists[k]!.get(column)![which]));
  return { columns, area: pick(0), carry: pick(1) };
}

function placeOf({ columns }: CoverageRow): number {
  let place = 17;
  for (const places of columns) {
    for (const column of places) place = (Math.imul(place, 31) + column) | 0;
    place = Math.imul(place, 31) | 0;
  }
  return place;
}

/** Sums of the same edges differ by rounding alone. */
const SAME_FRACTION = 1e-12;

function isSame(a: CoverageRow, b: CoverageRow): boolean {
  const isNear = (own: Float64Array, other: Float64Array): boolean =>
    own.every((value, n) => Math.abs(value - other[n]!) <= SAME_FRACTION);
  return a.columns.every(
    (places, k) =>
      places.length === b.columns[k]!.length &&
      places.every((column, n) => column === b.columns[k]![n]) &&
      isNear(a.area[k]!, b.area[k]!) &&
      isNear(a.carry[k]!, b.carry[k]!),
  );
}

type Cells = Map<number, Map<number, [area: number, carry: number]>>;

/** Rings run counter-clockwise round covered area, so an edge that goes down has the area to its right. */
function scanEdge(x0: number, y0: number, x1: number, y1: number, xs: Float64Array, ys: Float64Array, cells: Cells): void {
  if (y0 === y1) return;
  const sign = y1 < y0 ? 1 : -1;
  const [xl, yl, xh, yh] = y0 < y1 ? [x0, y0, x1, y1] : [x1, y1, x0, y0];
  const slope = (xh - xl) / (yh - yl);
  for (let row = intervalAt(ys, yl); row < ys.length - 1; row++) {
    const from = Math.max(yl, ys[row]!);
    const to = Math.min(yh, ys[row + 1]!);
    if (ys[row]! >= yh) break;
    if (to <= from) continue;
    const height = ys[row + 1]! - ys[row]!;
    const a = xl + slope * (from - yl);
    const b = xl + slope * (to - yl);
    scanRow(a, b, (sign * (to - from)) / height, xs, row, cells);
  }
}

/** Part of an edge within one row, from x = a to x = b, `share` of the row's height tall (signed). */
function scanRow(a: number, b: number, share: number, xs: Float64Array, row: number, cells: Cells): void {
  const left = Math.min(a, b);
  const right = Math.max(a, b);
  let list = cells.get(row);
  if (list === undefined) cells.set(row, (list = new Map()));
  const first = intervalAt(xs, left);
  if (right <= xs[first + 1]! || right === left) {
    leave(list, first, share, (xs[first + 1]! - (left + right) / 2) / (xs[first + 1]! - xs[first]!));
    return;
  }
  for (let column = first; column < xs.length - 1 && xs[column]! < right; column++) {
    const from = Math.max(left, xs[column]!);
    const to = Math.min(right, xs[column + 1]!);
    if (to <= from) continue;
    leave(
      list,
      column,
      (share * (to - from)) / (right - left),
      (xs[column + 1]! - (from + to) / 2) / (xs[column + 1]! - xs[column]!),
    );
  }
}

function leave(list: Map<number, [number, number]>, column: number, carry: number, covered: number): void {
  const entry = list.get(column);
  if (entry === undefined) list.set(column, [carry * covered, carry]);
  else {
    entry[0] += carry * covered;
    entry[1] += carry;
  }
}
