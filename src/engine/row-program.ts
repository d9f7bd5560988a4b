// Owns the row program: how a row's coefficients become spans, with absorber and drive terms where they are due.
// Must not know where coefficients come from.
import type { AbsorberProfile } from './absorber.ts';
import type { CoefficientRow, Coefficients } from './coefficients.ts';
import type { Grid } from './grid.ts';
import type { ImageWriter } from './image.ts';
import * as L from './layout.ts';

/** A term of a drive on one unknown of a row, ready for the image. */
export interface PointTerm {
  readonly field: 'u' | 'vx' | 'vy';
  readonly row: number;
  readonly i: number;
  readonly weight: number;
  /** Where its value lies at step 0 (of the slice in the source table, of the block in a line), and bytes to the next step. */
  readonly source: { readonly from: 'table' | 'line'; readonly offset: number; readonly stepBytes: number };
}

/** What a probe takes from one unknown of a row. */
export interface TapTerm {
  readonly field: 'u' | 'vx' | 'vy';
  readonly row: number;
  readonly i: number;
  readonly channel: number;
  readonly weight: number;
}

export const FIELD_NUMBER = { u: 0, vx: 1, vy: 2 } as const;

/** Plain runs shorter than this many groups of four are not worth a span of their own. */
const LEAST_PLAIN_GROUPS = 4;

interface Span {
  readonly kind: number;
  readonly group: number;
  readonly groups: number;
  readonly coefficients: number;
  readonly scalars: readonly [bu: number, bvx: number, bvy: number];
}

/** State that follows the fixed image: psi of the absorbers, handed out as the program is written. */
export interface StateTaker {
  take(bytes: number): number;
}

export interface RowStatistics {
  plainCells: number;
  mixedCells: number;
}

/** Writes the programs of all rows; returns the offset of each row's program, index 1 being the first row. */
export function writeRowPrograms(
  image: ImageWriter,
  state: StateTaker,
  grid: Grid,
  coefficients: Coefficients,
  points: readonly PointTerm[],
  taps: readonly TapTerm[],
): { offsets: number[]; statistics: RowStatistics } {
  const pointsOfRow = groupByRow(points);
  const tapsOfRow = groupByRow(taps);
  const groups = Math.ceil((grid.x.count + 1) / 4);
  const strips = absorberGroups(grid, coefficients, groups);
  const stripTables = new Map<string, number>();
  const spanCache = new Map<string, Span[]>();
  const statistics: RowStatistics = { plainCells: 0, mixedCells: 0 };
  const offsets = [0];

  for (let row = 0; row <= grid.y.count; row++) {
    const rowPoints = pointsOfRow.get(row) ?? [];
    const inStripY = inAbsorber(coefficients.absorbY.u, row) || inAbsorber(coefficients.absorbY.link, row);
    const worked = new Uint8Array(groups);
    if (inStripY) worked.fill(1);
    else for (let g = 0; g < groups; g++) worked[g] = strips[g]!;
    for (const point of rowPoints) worked[point.i >> 2] = 1;
    const key = `${coefficients.keyOf(row)}#${rowPoints.map((point) => point.i >> 2).join()}#${inStripY}`;
    let spans = spanCache.get(key);
    if (spans === undefined) {
      spans = makeSpans(image, coefficients.rowAt(row), groups, worked, strips);
      spanCache.set(key, spans);
    }
    for (const span of spans) {
      const cells = span.groups * 4;
      if (span.kind === L.PLAIN) statistics.plainCells += cells;
      else statistics.mixedCells += cells;
    }
    const wrap = grid.x.repeats ? coefficients.rowAt(row).wrap : null;
    offsets.push(
      writeRow({
        image,
        state,
        coefficients,
        row,
        spans,
        strips,
        stripTables,
        inStripY,
        points: rowPoints,
        taps: tapsOfRow.get(row) ?? [],
        wrap,
        lastColumn: L.PAD_COLUMNS + grid.x.count - 1,
      }),
    );
  }
  return { offsets, statistics };
}

function groupByRow<T extends { readonly row: number }>(terms: readonly T[]): Map<number, T[]> {
  const rows = new Map<number, T[]>();
  for (const term of terms) {
    const list = rows.get(term.row);
    if (list === undefined) rows.set(term.row, [term]);
    else list.push(term);
  }
  return rows;
}

function inAbsorber(profile: AbsorberProfile, k: number): boolean {
  return k < profile.c.length && profile.c[k] !== 0;
}

/** 1 for groups of four columns that hold an unknown of the left or right absorber. */
function absorberGroups(grid: Grid, coefficients: Coefficients, groups: number): Uint8Array {
  const strips = new Uint8Array(groups);
  for (let i = 0; i <= grid.x.count; i++) {
    if (inAbsorber(coefficients.absorbX.u, i) || inAbsorber(coefficients.absorbX.link, i)) strips[i >> 2] = 1;
  }
  return strips;
}

/** Cuts a row into spans: plain where four and four cells share lossless scalars, else arrays; worked where flagged. */
function makeSpans(image: ImageWriter, row: CoefficientRow, groups: number, worked: Uint8Array, strips: Uint8Array): Span[] {
  const columns = groups * 4;
  const padded = (values: Float32Array, filler: number): Float32Array => {
    const out = new Float32Array(columns).fill(filler);
    out.set(values);
    return out;
  };
  const au = padded(row.au, 1);
  const avx = padded(row.avx, 1);
  const avy = padded(row.avy, 1);
  const bu = padded(row.bu, 0);
  const bvx = padded(row.bvx, 0);
  const bvy = padded(row.bvy, 0);
  // Class of each group: a plain class by its scalars, or array classes by loss, or worked ones by strip.
  const classes: string[] = [];
  for (let g = 0; g < groups; g++) {
    const c = 4 * g;
    let lossless = true;
    let even = true;
    for (let k = c; k < c + 4; k++) {
      if (au[k] !== 1 || avx[k] !== 1 || avy[k] !== 1) lossless = false;
      if (bu[k] !== bu[c] || bvx[k] !== bvx[c] || bvy[k] !== bvy[c]) even = false;
    }
    if (worked[g] === 1) classes.push(`${lossless ? 'worked lossless' : 'worked lossy'} ${strips[g]}`);
    else if (lossless && even) classes.push(`plain ${bu[c]} ${bvx[c]} ${bvy[c]}`);
    else classes.push(lossless ? 'lossless' : 'lossy');
  }
  dissolveShortPlainRuns(classes);
  mergeLoss(classes);

  const spans: Span[] = [];
  for (let g = 0; g < groups;) {
    let end = g + 1;
    while (end < groups && classes[end] === classes[g]) end++;
    const name = classes[g]!;
    const from = 4 * g;
    const to = 4 * end;
    const cut = (values: Float32Array): Float32Array => values.subarray(from, to);
    const scalars = [bu[from]!, bvx[from]!, bvy[from]!] as const;
    const kind = kindOf(name, cut(bu), cut(bvx), cut(bvy));
    const arrays = ARRAYS[kind & L.KIND_MASK]!.map((which) => cut([bu, bvx, bvy, au, avx, avy][which]!));
    const at = image.take(4 * (to - from) * arrays.length);
    arrays.forEach((values, k) => image.singles(at + 4 * (to - from) * k, values));
    spans.push({ kind, group: g, groups: end - g, coefficients: at, scalars });
    g = end;
  }
  return spans;
}

/** Arrays of each kind, as places in [bu, bvx, bvy, au, avx, avy]. */
const ARRAYS: Readonly<Record<number, readonly number[]>> = {
  [L.PLAIN]: [],
  [L.NODES]: [0],
  [L.LINKS]: [1, 2],
  [L.LOSSLESS]: [0, 1, 2],
  [L.LOSSY]: [0, 1, 2, 3, 4, 5],
};

function kindOf(name: string, bu: Float32Array, bvx: Float32Array, bvy: Float32Array): number {
  if (name.startsWith('plain')) return L.PLAIN;
  if (name.startsWith('worked')) return L.WORKED | (name.includes('lossy') ? L.LOSSY : L.LOSSLESS);
  if (name === 'lossy') return L.LOSSY;
  const even = (values: Float32Array): boolean => values.every((value) => value === values[0]);
  return even(bvx) && even(bvy) ? L.NODES : even(bu) ? L.LINKS : L.LOSSLESS;
}

/** A short plain run between array runs costs more to enter than its arrays. */
function dissolveShortPlainRuns(classes: string[]): void {
  for (let g = 0; g < classes.length;) {
    let end = g + 1;
    while (end < classes.length && classes[end] === classes[g]) end++;
    if (classes[g]!.startsWith('plain') && end - g < LEAST_PLAIN_GROUPS) classes.fill('lossless', g, end);
    g = end;
  }
}

/** Neighbouring array runs of which one has loss become one lossy run when the lossless one is short. */
function mergeLoss(classes: string[]): void {
  for (let g = 0; g < classes.length;) {
    let end = g + 1;
    while (end < classes.length && classes[end] === classes[g]) end++;
    const touchesLossy = classes[g - 1] === 'lossy' || classes[end] === 'lossy';
    if (classes[g] === 'lossless' && touchesLossy && end - g < LEAST_PLAIN_GROUPS) classes.fill('lossy', g, end);
    g = end;
  }
}

interface RowParts {
  readonly image: ImageWriter;
  readonly state: StateTaker;
  readonly coefficients: Coefficients;
  readonly row: number;
  readonly spans: readonly Span[];
  readonly strips: Uint8Array;
  readonly stripTables: Map<string, number>;
  readonly inStripY: boolean;
  readonly points: readonly PointTerm[];
  readonly taps: readonly TapTerm[];
  readonly wrap: readonly [number, number] | null;
  readonly lastColumn: number;
}

function writeRow(parts: RowParts): number {
  const { image, spans, taps, wrap } = parts;
  const at = image.take(4 * (1 + spans.length * L.SPAN_WORDS + L.WRAP_WORDS + 1 + taps.length * L.TAP_WORDS));
  image.word(at, 0, spans.length);
  spans.forEach((span, k) => writeSpan(parts, span, at + 4 * (1 + k * L.SPAN_WORDS)));
  const wrapAt = at + 4 * (1 + spans.length * L.SPAN_WORDS);
  if (wrap !== null) {
    image.word(wrapAt, L.WRAP_FIRST, L.PAD_COLUMNS);
    image.word(wrapAt, L.WRAP_LAST, parts.lastColumn);
    image.single(wrapAt, L.WRAP_A, wrap[0]);
    image.single(wrapAt, L.WRAP_B, wrap[1]);
  }
  const tapsAt = wrapAt + 4 * L.WRAP_WORDS;
  image.word(tapsAt, 0, taps.length);
  taps.forEach((tap, k) => {
    const record = tapsAt + 4 * (1 + k * L.TAP_WORDS);
    image.word(record, L.TAP_FIELD, FIELD_NUMBER[tap.field]);
    image.word(record, L.TAP_COLUMN, L.PAD_COLUMNS + tap.i);
    image.word(record, L.TAP_CHANNEL, tap.channel);
    image.single(record, L.TAP_WEIGHT, tap.weight);
  });
  return at;
}

function writeSpan(parts: RowParts, span: Span, at: number): void {
  const { image, state, coefficients, row } = parts;
  const first = 4 * span.group;
  const count = 4 * span.groups;
  image.word(at, L.SPAN_KIND, span.kind);
  image.word(at, L.SPAN_COLUMN, L.PAD_COLUMNS + first);
  image.word(at, L.SPAN_COUNT, count);
  image.word(at, L.SPAN_COEFFICIENTS, span.coefficients);
  image.single(at, L.SPAN_BU, span.scalars[0]);
  image.single(at, L.SPAN_BVX, span.scalars[1]);
  image.single(at, L.SPAN_BVY, span.scalars[2]);
  if ((span.kind & L.WORKED) === 0) return;
  if (parts.strips[span.group] === 1) {
    image.word(at, L.SPAN_ABSORB_X, stripTable(parts, first, count));
    image.word(at, L.SPAN_PSI_X, state.take(8 * count));
  }
  if (parts.inStripY) {
    const { u, link } = coefficients.absorbY;
    image.word(at, L.SPAN_PSI_Y, state.take(8 * count));
    image.single(at, L.SPAN_Y_BU, u.b[row] ?? 0);
    image.single(at, L.SPAN_Y_CU, u.c[row] ?? 0);
    image.single(at, L.SPAN_Y_BV, link.b[row] ?? 0);
    image.single(at, L.SPAN_Y_CV, link.c[row] ?? 0);
  }
  const own = parts.points.filter((point) => point.i >= first && point.i < first + count);
  const ordered = [...own.filter((point) => point.field === 'u'), ...own.filter((point) => point.field !== 'u')];
  const pointsAt = image.take(4 * L.POINT_WORDS * ordered.length);
  image.word(at, L.SPAN_POINTS, pointsAt);
  image.word(at, L.SPAN_U_POINTS, own.filter((point) => point.field === 'u').length);
  image.word(at, L.SPAN_V_POINTS, own.filter((point) => point.field !== 'u').length);
  ordered.forEach((point, k) => {
    const record = pointsAt + 4 * k * L.POINT_WORDS;
    image.word(record, L.POINT_FIELD, FIELD_NUMBER[point.field]);
    image.word(record, L.POINT_COLUMN, L.PAD_COLUMNS + point.i);
    image.word(record, L.POINT_FROM_TABLE, point.source.from === 'table' ? 1 : 0);
    image.word(record, L.POINT_SOURCE, point.source.offset);
    image.word(record, L.POINT_STEP, point.source.stepBytes);
    image.double(record, L.POINT_WEIGHT, point.weight);
  });
}

/** b, c of u then b, c of the links over the columns of a span; rows share the table. */
function stripTable(parts: RowParts, first: number, count: number): number {
  const key = `${first}:${count}`;
  const found = parts.stripTables.get(key);
  if (found !== undefined) return found;
  const { u, link } = parts.coefficients.absorbX;
  const at = parts.image.take(16 * count);
  [u.b, u.c, link.b, link.c].forEach((values, k) => {
    const out = new Float32Array(count);
    for (let n = 0; n < count; n++) out[n] = values[first + n] ?? 0;
    parts.image.singles(at + 4 * count * k, out);
  });
  parts.stripTables.set(key, at);
  return at;
}
