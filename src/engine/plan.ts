// Owns the run plan: a job turned into a memory image and all that is needed to run and read it. Pure and cloneable.
// Must not know workers, clocks or how the image is stepped.
import { fail, ok, type Result } from '../base/result.ts';
import type { ResolvedJob } from '../model/job.ts';
import { makeCoefficients, type CoefficientRow, type Coefficients } from './coefficients.ts';
import { estimateOf, type Estimate } from './estimate.ts';
import type { Remark } from './remark.ts';
import { makeGrid, type Grid } from './grid.ts';
import { hashText } from './hash.ts';
import { BLOCK_STEPS, checkFeasible, SLICE_STEPS, type Feasible } from './feasible.ts';
import { align, ImageWriter, rowStride, StateRoom } from './image.ts';
import * as L from './layout.ts';
import { paintParts } from './paint.ts';
import { makeFaceTerms, makeIncidentLine, type IncidentLine, type Launch } from './plane-wave.ts';
import { makeProbeTaps, nodeShares } from './probe-taps.ts';
import { writeRowPrograms, type PointTerm } from './row-program.ts';
import { makeWaveform, waveformEnd, type Waveform } from './waveform.ts';

export type RunRole = 'main' | 'reference';

/** Feed of an incident line, evaluated slice by slice. */
export interface LineFeed {
  readonly tableOffset: number;
  readonly fed: number;
  readonly amplitude: number;
  readonly delaySeconds: number;
  readonly waveform: Waveform;
}

/** Where the fields lie in the image and how to make physical fields of them. */
export interface FieldGeometry {
  readonly uOffset: number;
  readonly vxOffset: number;
  readonly vyOffset: number;
  readonly stride: number;
  readonly countX: number;
  readonly countY: number;
  /** Rows of each field: countY + 3, row 1 being the first unknowns. */
  readonly rows: number;
  /** Unknowns that lie on the sheet: first and last column and row (numbered from 0). */
  readonly firstColumn: number;
  readonly lastColumn: number;
  readonly firstRow: number;
  readonly lastRow: number;
  readonly uScale: number;
  readonly vScale: number;
  readonly dxMetres: number;
  readonly dyMetres: number;
}

export interface RunPlan {
  readonly role: RunRole;
  readonly hash: string;
  readonly section: ResolvedJob['section'];
  readonly estimate: Estimate;
  readonly dtSeconds: number;
  readonly stepLimit: number;
  /** Most steps in one call of the kernel. */
  readonly slice: number;
  /** Most threads that can work on it: 1, or as many as were offered and are of use. */
  readonly threads: number;
  /** Bytes of the whole image; header and `fixed` are given, the rest is zero at t = 0. */
  readonly imageBytes: number;
  readonly header: Int32Array<ArrayBuffer>;
  readonly fixed: ArrayBuffer;
  readonly fixedOffset: number;
  readonly recordOffset: number;
  readonly sourceTableOffset: number;
  /** One waveform a source; the weights in the image carry amplitude. Evaluated half a step before u. */
  readonly sources: readonly Waveform[];
  readonly feeds: readonly LineFeed[];
  readonly probeIds: readonly string[];
  readonly fields: FieldGeometry;
  readonly decayDb: number;
  /** Decay is judged after this time: the drives have played out. */
  readonly drivenSeconds: number;
  readonly frequenciesHertz: Float64Array<ArrayBuffer>;
  /** Waveform of the first drive, for the spectrum of the drive. */
  readonly driveWaveform: Waveform | null;
}

/** Million cell updates a second, for the time at most until the machine has been measured. */
export const NOMINAL_SPEED = 500;

/**
 * Makes the plan of a job. The reference plan keeps grid, launch and drives of the main one and leaves out the parts
 * marked so, or all of them. `threads` is how many may work on the run; the numbers do not depend on it. Errors: no drive, a drive in metal, a plane wave that fits no launch, a job over the memory
 * limit, a grid out of range.
 */
export function makePlan(job: ResolvedJob, role: RunRole, threads = 1): Result<RunPlan> {
  const gridResult = makeGrid(job);
  if (!gridResult.ok) return gridResult;
  const grid = gridResult.value;
  const feasible = checkFeasible(job, grid, threads);
  if (!feasible.ok) return feasible;
  const parts =
    role === 'main' ? job.parts : job.reference === 'empty sheet' ? [] : job.parts.filter((part) => !part.leftOutOfReference);
  const regions = paintParts(parts, job.sheet);
  const coefficients = withCache(makeCoefficients(grid, regions, job.sheet.background, job.band));
  return writePlan(job, role, grid, coefficients, feasible.value);
}

/** Rows of coefficients are asked for by spans, drives and faces: made once per key. */
function withCache(coefficients: Coefficients): Coefficients {
  const rows = new Map<string, CoefficientRow>();
  return {
    ...coefficients,
    rowAt(row) {
      const key = coefficients.keyOf(row);
      let made = rows.get(key);
      if (made === undefined) rows.set(key, (made = coefficients.rowAt(row)));
      return made;
    },
  };
}

function writePlan(
  job: ResolvedJob,
  role: RunRole,
  grid: Grid,
  coefficients: Coefficients,
  { launches, bound, buffers }: Feasible,
): Result<RunPlan> {
  const stateBound = bound.state;
  const { x, y } = grid;
  const stride = rowStride(x.count);
  const rows = y.count + 3;
  const state = new StateRoom(4 * L.HEADER_WORDS, stateBound);
  const image = new ImageWriter(stateBound);
  const header = new Int32Array(L.HEADER_WORDS);
  // Fields start a few cache lines apart from each other's multiples of 4 KiB, which would fall into the same sets.
  const uOffset = state.take(4 * rows * stride + 192);
  const vxOffset = state.take(4 * rows * stride + 320);
  const vyOffset = state.take(4 * rows * stride + 448);
  const channels = 3 * job.probes.length;
  const recordOffset = state.take(4 * SLICE_STEPS * Math.max(1, channels));

  const sourceCount = job.drives.filter((drive) => drive.kind === 'line current').length;
  const sourceTableOffset = state.take(8 * SLICE_STEPS * Math.max(1, sourceCount));
  const drives = writeDrives(job, grid, coefficients, launches, buffers, state, image, {
    offset: sourceTableOffset,
    stepBytes: 8 * sourceCount,
  });
  if (!drives.ok) return drives;
  const { sources, feeds, points, lineTableOffset, lineCount, angleRemarks } = drives.value;
  const taps = job.probes.flatMap((probe, p) => makeProbeTaps(grid, probe.at, job.sheet.originMetres, p));
  const { offsets } = writeRowPrograms(image, state, grid, coefficients, points, taps);
  const rowTable = image.take(4 * offsets.length);
  offsets.forEach((offset, j) => image.word(rowTable, j, offset));

  header[L.H_STRIDE] = stride;
  header[L.H_ROWS] = y.count + 1;
  header[L.H_U] = uOffset;
  header[L.H_VX] = vxOffset;
  header[L.H_VY] = vyOffset;
  header[L.H_ROW_TABLE] = rowTable;
  header[L.H_CHANNELS] = channels;
  header[L.H_RECORD] = recordOffset;
  header[L.H_SOURCES] = sources.length;
  header[L.H_SOURCE_TABLE] = sourceTableOffset;
  header[L.H_LINES] = lineCount;
  header[L.H_LINE_TABLE] = lineTableOffset;
  header[L.H_WRAP_Y] = y.repeats ? 1 : 0;
  header[L.H_SLICE] = SLICE_STEPS;
  header[L.H_BUFFERS] = buffers;
  // A repeating top edge closes the loop of rows after every step.
  header[L.H_BLOCK] = y.repeats ? 1 : BLOCK_STEPS;

  const fixed = image.finish();
  const imageBytes = stateBound + fixed.byteLength;
  const waveforms = [...sources, ...feeds.map((feed) => feed.waveform)];
  const stepLimit = Math.max(1, Math.ceil(job.stop.afterSeconds / grid.dtSeconds));
  return ok({
    role,
    hash: hashText(JSON.stringify([role, role === 'main' ? null : job.reference, job])),
    section: job.section,
    estimate: estimateOf(job, grid, imageBytes, NOMINAL_SPEED, launches, angleRemarks),
    dtSeconds: grid.dtSeconds,
    stepLimit,
    slice: SLICE_STEPS,
    threads: Math.max(1, buffers - 1),
    imageBytes,
    header,
    fixed,
    fixedOffset: stateBound,
    recordOffset,
    sourceTableOffset,
    sources,
    feeds,
    probeIds: job.probes.map((probe) => probe.id),
    fields: fieldGeometry(grid, coefficients, uOffset, vxOffset, vyOffset, stride),
    decayDb: job.stop.decayDb,
    drivenSeconds: Math.max(...waveforms.map(waveformEnd)),
    frequenciesHertz: frequenciesOf(job),
    driveWaveform: waveforms[0] ?? null,
  });
}

function fieldGeometry(
  grid: Grid,
  coefficients: Coefficients,
  uOffset: number,
  vxOffset: number,
  vyOffset: number,
  stride: number,
): FieldGeometry {
  const range = (axis: Grid['x']): [number, number] => {
    const low = axis.lines[axis.before]! - 1e-12;
    const high = axis.lines[axis.before + axis.cells]! + 1e-12;
    let first = 0;
    while (axis.position[first]! < low) first++;
    let last = axis.count - 1;
    while (axis.position[last]! > high) last--;
    return [first, last];
  };
  const [firstColumn, lastColumn] = range(grid.x);
  const [firstRow, lastRow] = range(grid.y);
  return {
    uOffset,
    vxOffset,
    vyOffset,
    stride,
    countX: grid.x.count,
    countY: grid.y.count,
    rows: grid.y.count + 3,
    firstColumn,
    lastColumn,
    firstRow,
    lastRow,
    uScale: coefficients.uScale,
    vScale: coefficients.vScale,
    dxMetres: grid.dxMetres,
    dyMetres: grid.dyMetres,
  };
}

/** The even band and the listed frequencies, merged, rising, without repeats. */
export function frequenciesOf(job: ResolvedJob): Float64Array<ArrayBuffer> {
  const { fromHertz, toHertz, points, listedHertz } = job.band;
  const all = new Set<number>(listedHertz);
  for (let k = 0; k < points; k++) all.add(points === 1 ? fromHertz : fromHertz + ((toHertz - fromHertz) * k) / (points - 1));
  return Float64Array.from(all).sort();
}

interface DriveParts {
  readonly sources: Waveform[];
  readonly feeds: LineFeed[];
  readonly points: PointTerm[];
  readonly lineTableOffset: number;
  readonly lineCount: number;
  readonly angleRemarks: Remark[];
}

function writeDrives(
  job: ResolvedJob,
  grid: Grid,
  coefficients: Coefficients,
  launches: ReadonlyMap<string, Launch>,
  buffers: number,
  state: StateRoom,
  image: ImageWriter,
  table: { readonly offset: number; readonly stepBytes: number },
): Result<DriveParts> {
  const sources: Waveform[] = [];
  const feeds: LineFeed[] = [];
  const points: PointTerm[] = [];
  const angleRemarks: Remark[] = [];
  const lineTableOffset = image.take(4 * L.LINE_WORDS * launches.size);
  let lineCount = 0;
  for (const drive of job.drives) {
    const waveform = makeWaveform(drive.waveform, job.band.fromHertz, job.band.toHertz);
    if (drive.kind === 'line current') {
      const own = lineCurrentTerms(job, grid, coefficients, drive.at, drive.amplitude, {
        from: 'table',
        offset: table.offset + 8 * sources.length,
        stepBytes: table.stepBytes,
      });
      if (own.every((term) => term.weight === 0)) {
        return fail({
          code: 'drive in metal',
          path: drive.id,
          message: `${drive.name} stands in metal or on a metal edge, where it launches nothing.`,
          hint: 'Move it by at least a cell into the open.',
        });
      }
      points.push(...own);
      sources.push(waveform);
      continue;
    }
    const launch = launches.get(drive.id)!;
    const line = makeIncidentLine(job, grid, drive, launch, waveform);
    const record = lineTableOffset + 4 * L.LINE_WORDS * lineCount++;
    const { feed, sourceOf } = writeLine(image, state, record, line, buffers);
    feeds.push(feed);
    for (const term of makeFaceTerms(grid, launch, line)) {
      const row = coefficients.rowAt(term.j);
      const b = (term.field === 'u' ? row.bu : term.field === 'vx' ? row.bvx : row.bvy)[term.i]!;
      points.push({
        field: term.field,
        row: term.j,
        i: term.i,
        weight: term.sign * b * term.scale,
        source: sourceOf(term.from, term.entry),
      });
    }
    if (Math.abs(Math.sin(line.angleRadians - drive.angleRadians)) > 1e-6) {
      angleRemarks.push({
        code: 'angle taken',
        path: drive.id,
        message: `${drive.name} travels at ${((line.angleRadians * 180) / Math.PI).toFixed(3)} deg: the nearest angle whose steps on the grid are whole numbers.`,
      });
    }
  }
  return ok({ sources, feeds, points, lineTableOffset, lineCount, angleRemarks });
}

/** A current shared by straight-line weights among the u around it: u' -= bu vScale I, README.md equation 11. */
function lineCurrentTerms(
  job: ResolvedJob,
  grid: Grid,
  coefficients: Coefficients,
  at: readonly [number, number],
  amplitude: number,
  source: PointTerm['source'],
): PointTerm[] {
  const columns = nodeShares(grid.x, at[0] + job.sheet.originMetres[0]);
  const rows = nodeShares(grid.y, at[1] + job.sheet.originMetres[1]);
  const terms: PointTerm[] = [];
  for (const [j, wj] of rows) {
    for (const [i, wi] of columns) {
      const weight = -coefficients.rowAt(j).bu[i]! * coefficients.vScale * amplitude * wi * wj;
      terms.push({ field: 'u', row: j, i, weight, source });
    }
  }
  return terms;
}

function writeLine(
  image: ImageWriter,
  state: StateRoom,
  record: number,
  line: IncidentLine,
  buffers: number,
): { feed: LineFeed; sourceOf: (field: 'u' | 'vx' | 'vy', entry: number) => PointTerm['source'] } {
  const level = align(24 * line.length);
  const start = state.take(level * (BLOCK_STEPS + 1) * buffers);
  const offsets = { u: start, vx: start + 8 * line.length, vy: start + 16 * line.length };
  const a = image.take(8 * line.a.length);
  const b = image.take(8 * line.b.length);
  image.doubles(a, line.a);
  image.doubles(b, line.b);
  const tableOffset = state.take(8 * SLICE_STEPS * line.fed);
  image.word(record, L.LINE_LENGTH, line.length);
  image.word(record, L.LINE_MX, line.mx);
  image.word(record, L.LINE_MY, line.my);
  image.word(record, L.LINE_FED, line.fed);
  image.word(record, L.LINE_U, offsets.u);
  image.word(record, L.LINE_VX, offsets.vx);
  image.word(record, L.LINE_VY, offsets.vy);
  image.word(record, L.LINE_LEVEL, level);
  image.word(record, L.LINE_A, a);
  image.word(record, L.LINE_B, b);
  image.word(record, L.LINE_FEED, tableOffset);
  image.double(record, L.LINE_BU, line.bu);
  image.double(record, L.LINE_BVX, line.bvx);
  image.double(record, L.LINE_BVY, line.bvy);
  return {
    feed: { tableOffset, fed: line.fed, amplitude: line.amplitude, delaySeconds: line.delaySeconds, waveform: line.waveform },
    // Terms on u take v of the level before the step, terms on v take u of the level after it.
    sourceOf: (field, entry) => ({
      from: 'line',
      offset: offsets[field] + 8 * entry + (field === 'u' ? level : 0),
      stepBytes: level,
    }),
  };
}
