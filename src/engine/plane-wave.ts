// Owns how a plane wave enters: the choice of launch, the incident line, and the terms along the faces.
// Must not know spans or bytes; plan.ts writes what is made here into the image.
// Source: T. Tan and M. Potter, IEEE Trans. Antennas Propag. 58 (2010) 3139, for the line that matches the grid's own
// dispersion at rational angles; A. Taflove and S. C. Hagness, Computational Electrodynamics, ch. 5, for the faces.
import { C0, ETA0 } from '../base/constants.ts';
import { fail, ok, type Result } from '../base/result.ts';
import type { EdgeName, ResolvedDrive, ResolvedJob } from '../model/job.ts';
import { outlineBounds } from '../model/outline.ts';
import { kernelScales } from './coefficients.ts';
import type { Grid } from './grid.ts';
import { constantsOf } from './media.ts';
import { waveformAt, type Waveform } from './waveform.ts';

/** Inside these unknowns (inclusive) the field is the total one, outside only the scattered one. */
export interface TotalField {
  readonly faces: readonly EdgeName[];
  readonly i0: number;
  readonly i1: number;
  readonly j0: number;
  readonly j1: number;
}

export interface Launch extends TotalField {
  readonly kind: 'box' | 'full height';
  /** In words, for the person. */
  readonly words: string;
}

/** Cells between the sheet's edge and the faces of the box, and parts must keep as many from the faces. */
const BOX_INSET = 3;
const CLEARANCE = 2;
/** Finest steps of the angle: tan(angle) dx/dy is taken as a ratio of whole numbers up to this. */
const MOST_STEPS = 40;

/** Entries of the line's absorbing tail per fed entry, and sigma dt / 2 eps at its end. */
const TAIL_PER_FED = 60;
const MOST_TAIL_LOSS = 0.3;

type PlaneWave = Extract<ResolvedDrive, { kind: 'plane wave' }>;

/** Chooses the launch from the geometry of the job, or says why none fits. */
export function chooseLaunch(job: ResolvedJob, grid: Grid, drive: PlaneWave): Result<Launch> {
  const { background, edges } = job.sheet;
  const refuse = (message: string, hint: string): Result<Launch> =>
    fail({ code: 'plane wave does not fit', path: drive.id, message: `${drive.name}: ${message}`, hint });
  if (background.metal || background.sigma > 0 || background.sigmaMagnetic > 0) {
    return refuse('a plane wave needs a lossless background.', 'Fill the sheet with a lossless material, or use a line current.');
  }
  const box = boxLaunch(job, grid);
  if (typeof box !== 'string') return ok(box);

  const quarter = drive.angleRadians / (Math.PI / 2);
  const turns = ((Math.round(quarter) % 4) + 4) % 4;
  const entering = (['left', 'bottom', 'right', 'top'] as const)[turns]!;
  const horizontal = entering === 'left' || entering === 'right';
  const sides: readonly [EdgeName, EdgeName] = horizontal ? ['bottom', 'top'] : ['left', 'right'];
  const wanted = job.section === 'E out of plane' ? 'magnetic' : 'metal';
  if (Math.abs(quarter - Math.round(quarter)) > 1e-9) {
    return refuse(
      `${box} A wave at an angle can only be launched round bodies that stand inside the sheet.`,
      `Let it travel along 0, 90, 180 or 270 deg with ${wanted} edges at its sides, or move every part at least ${BOX_INSET + CLEARANCE} cells inside four absorbing edges.`,
    );
  }
  const fits = sides.every((side) => edges[side] === wanted) || sides.every((side) => edges[side] === 'repeating');
  if (!fits) {
    return refuse(
      `${box} A wave over the full ${horizontal ? 'height' : 'width'} needs ${wanted} (or repeating) edges at its sides; they are ${edges[sides[0]]} and ${edges[sides[1]]}.`,
      `Make the ${sides[0]} and ${sides[1]} edges ${wanted}, or move every part at least ${BOX_INSET + CLEARANCE} cells inside four absorbing edges.`,
    );
  }
  if (edges[entering] !== 'absorbing') {
    return refuse(
      `it comes in through the ${entering} edge, which is ${edges[entering]}.`,
      `Make the ${entering} edge absorbing, or turn the wave round.`,
    );
  }
  return fullHeightLaunch(job, grid, entering, refuse);
}

/** The box just inside four absorbing edges, or why it cannot be. */
function boxLaunch(job: ResolvedJob, grid: Grid): Launch | string {
  const { edges, widthMetres, heightMetres, originMetres } = job.sheet;
  const open = (['left', 'right', 'bottom', 'top'] as const).filter((edge) => edges[edge] !== 'absorbing');
  if (open.length > 0)
    return `The ${open.join(' and ')} ${open.length > 1 ? 'edges do' : 'edge does'} not absorb, so no total-field box fits.`;
  const marginX = (BOX_INSET + CLEARANCE) * grid.dxMetres;
  const marginY = (BOX_INSET + CLEARANCE) * grid.dyMetres;
  for (const part of job.parts) {
    for (const [x, y] of part.outline.flat()) {
      const px = x + originMetres[0];
      const py = y + originMetres[1];
      if (px < marginX || px > widthMetres - marginX || py < marginY || py > heightMetres - marginY) {
        return `${part.name} reaches the sheet's edge, so no total-field box fits round it.`;
      }
    }
  }
  const range = (axis: Grid['x']): [number, number] => {
    const low = axis.lines[axis.before + BOX_INSET]!;
    const high = axis.lines[axis.before + axis.cells - BOX_INSET]!;
    const inside = [...axis.position.keys()].filter((k) => axis.position[k]! > low - 1e-9 && axis.position[k]! < high + 1e-9);
    return [inside[0]!, inside[inside.length - 1]!];
  };
  if (grid.x.cells < 4 * BOX_INSET || grid.y.cells < 4 * BOX_INSET) return 'The sheet has too few cells for a total-field box.';
  const [i0, i1] = range(grid.x);
  const [j0, j1] = range(grid.y);
  return {
    kind: 'box',
    words: `through a total-field box ${BOX_INSET} cells inside the absorbing edges; outside it only the scattered field is left`,
    faces: ['left', 'right', 'bottom', 'top'],
    i0,
    i1,
    j0,
    j1,
  };
}

function fullHeightLaunch(
  job: ResolvedJob,
  grid: Grid,
  entering: EdgeName,
  refuse: (message: string, hint: string) => Result<Launch>,
): Result<Launch> {
  const horizontal = entering === 'left' || entering === 'right';
  const axis = horizontal ? grid.x : grid.y;
  const low = entering === 'left' || entering === 'bottom';
  const line = low ? axis.lines[axis.before + BOX_INSET]! : axis.lines[axis.before + axis.cells - BOX_INSET]!;
  const spacing = horizontal ? grid.dxMetres : grid.dyMetres;
  const origin = job.sheet.originMetres[horizontal ? 0 : 1];
  for (const part of job.parts) {
    // Bands of a part count by its whole extent along the wave: the launch needs bare background before the first part.
    const { left, right, bottom, top } = outlineBounds(part.outline);
    const [from, to] = horizontal ? [left + origin, right + origin] : [bottom + origin, top + origin];
    if (low ? from < line + CLEARANCE * spacing : to > line - CLEARANCE * spacing) {
      return refuse(
        `${part.name} stands where the wave is launched, ${BOX_INSET} cells inside the ${entering} edge.`,
        `Leave at least ${BOX_INSET + CLEARANCE} cells (${((BOX_INSET + CLEARANCE) * spacing * 1e3).toPrecision(3)} mm) free there.`,
      );
    }
  }
  const k = [...axis.position.keys()].filter((n) => (low ? axis.position[n]! > line - 1e-9 : axis.position[n]! < line + 1e-9));
  const edge = low ? k[0]! : k[k.length - 1]!;
  const all = { i0: 0, i1: grid.x.count - 1, j0: 0, j1: grid.y.count - 1 };
  const total = horizontal
    ? low
      ? { ...all, i0: edge }
      : { ...all, i1: edge }
    : low
      ? { ...all, j0: edge }
      : { ...all, j1: edge };
  return ok({
    kind: 'full height',
    words: `over the full ${horizontal ? 'height' : 'width'}, ${BOX_INSET} cells inside the ${entering} edge; behind that line only the reflected field is left`,
    faces: [entering],
    ...total,
  });
}

/** The incident field on the grid: U[r] with r = r0 + mx (i - iRef) + my (j - jRef). See README.md, equations 12 to 15. */
export interface IncidentLine {
  readonly mx: number;
  readonly my: number;
  readonly length: number;
  readonly fed: number;
  /** Matched absorbing tail: a and b factors per half entry. */
  readonly a: Float64Array;
  readonly b: Float64Array;
  readonly bu: number;
  readonly bvx: number;
  readonly bvy: number;
  /** Value fed to entry r at time t: amplitude x waveform(t - r x delaySeconds). */
  readonly amplitude: number;
  readonly delaySeconds: number;
  /** Angle actually taken, radians. */
  readonly angleRadians: number;
  readonly waveform: Waveform;
  entryOf(i: number, j: number): number;
}

/** Nearest ratio p : q of whole numbers to cos : sin, signs kept. */
function wholeSteps(c: number, s: number): [number, number] {
  if (Math.abs(s) < 1e-12) return [Math.sign(c), 0];
  if (Math.abs(c) < 1e-12) return [0, Math.sign(s)];
  let best: [number, number] = [1, 0];
  let bestError = Infinity;
  const angle = Math.atan2(Math.abs(s), Math.abs(c));
  for (let most = 1; most <= MOST_STEPS; most++) {
    for (const [p, q] of [
      [most, Math.round(most * Math.tan(angle))],
      [Math.round(most / Math.tan(angle)), most],
    ] as const) {
      if (p > MOST_STEPS || q > MOST_STEPS) continue;
      const error = Math.abs(Math.atan2(q, p) - angle);
      // A finer ratio costs a longer line: take it only for a real gain.
      if (error < bestError - 2e-4) {
        bestError = error;
        best = [p, q];
      }
    }
  }
  return [best[0] * Math.sign(c), best[1] * Math.sign(s)];
}

interface LineGeometry {
  readonly mx: number;
  readonly my: number;
  readonly fed: number;
  /** The entry of the corner that the wave meets first. */
  readonly start: number;
  readonly tail: number;
  readonly length: number;
}

/** Steps along the line per cell, and how many entries it needs for what the launch spans. */
export function lineGeometry(grid: Grid, drive: PlaneWave, launch: Launch): LineGeometry {
  const clean = (value: number): number => (Math.abs(value) < 1e-9 ? 0 : value);
  const [mx, my] = wholeSteps(
    clean(Math.cos(drive.angleRadians)) * grid.dxMetres,
    clean(Math.sin(drive.angleRadians)) * grid.dyMetres,
  );
  const fed = Math.max(Math.abs(mx), Math.abs(my));
  const tail = TAIL_PER_FED * fed;
  const span = Math.abs(mx) * (launch.i1 - launch.i0 + 2) + Math.abs(my) * (launch.j1 - launch.j0 + 2);
  const start = 3 * fed;
  return { mx, my, fed, start, tail, length: start + span + 2 * fed + tail };
}

export function makeIncidentLine(
  job: ResolvedJob,
  grid: Grid,
  drive: PlaneWave,
  launch: Launch,
  waveform: Waveform,
): IncidentLine {
  const { dxMetres, dyMetres } = grid;
  const { mx, my, fed, start, tail, length } = lineGeometry(grid, drive, launch);
  const back = constantsOf(job.sheet.background, job.section);
  const index = Math.sqrt(back.uM * back.vM);
  const { uScale, pace } = kernelScales(grid);
  const a = new Float64Array(2 * length).fill(1);
  const b = new Float64Array(2 * length).fill(1);
  for (let half = 2 * (length - tail); half < 2 * length; half++) {
    // Electric and magnetic loss are matched only if each is taken where its own field stands.
    const loss = MOST_TAIL_LOSS * ((half / 2 - length + tail) / tail) ** 3;
    a[half] = (1 - loss) / (1 + loss);
    b[half] = 1 / (1 + loss);
  }
  // The corner that the wave meets first stands at entry `start`.
  const iRef = mx >= 0 ? launch.i0 : launch.i1;
  const jRef = my >= 0 ? launch.j0 : launch.j1;
  const angleRadians = Math.atan2(my / dyMetres, mx / dxMetres);
  // One entry further along the direction of travel.
  const stepMetres = mx !== 0 ? (dxMetres * Math.cos(angleRadians)) / mx : (dyMetres * Math.sin(angleRadians)) / my;
  const impedance = ETA0 * Math.sqrt(job.sheet.background.muRelative / job.sheet.background.epsilonRelative);
  const physical = job.section === 'E out of plane' ? drive.amplitude : drive.amplitude / impedance;
  return {
    mx,
    my,
    length,
    fed,
    a,
    b,
    bu: Math.fround((pace * pace) / (back.uM * dxMetres * dyMetres)),
    bvx: Math.fround(dxMetres / (back.vM * dyMetres)),
    bvy: Math.fround(dyMetres / (back.vM * dxMetres)),
    amplitude: physical * uScale,
    delaySeconds: (stepMetres * index) / C0,
    angleRadians,
    waveform,
    entryOf: (i, j) => start + mx * (i - iRef) + my * (j - jRef),
  };
}

/** Values fed to the line at time t, into out[at .. at + fed). */
export function feedInto(
  out: Float64Array,
  at: number,
  line: Pick<IncidentLine, 'fed' | 'amplitude' | 'delaySeconds' | 'waveform'>,
  t: number,
): void {
  for (let r = 0; r < line.fed; r++) out[at + r] = line.amplitude * waveformAt(line.waveform, t - r * line.delaySeconds);
}

/** One term of a face: field[column of row] += sign x b of that field there x the line's value. */
export interface FaceTerm {
  readonly field: 'u' | 'vx' | 'vy';
  readonly i: number;
  readonly j: number;
  readonly sign: 1 | -1;
  readonly from: 'u' | 'vx' | 'vy';
  readonly entry: number;
  /** Row or column side relative to a full cell: in-plane values of the line are for full cells. */
  readonly scale: number;
}

/** Terms along the faces. Links that cross a face carry the scattered field; README.md, equations 13 to 15. */
export function makeFaceTerms(grid: Grid, launch: Launch, line: IncidentLine): FaceTerm[] {
  const terms: FaceTerm[] = [];
  const { i0, i1, j0, j1 } = launch;
  const at = line.entryOf;
  for (const face of launch.faces) {
    if (face === 'left' || face === 'right') {
      const i = face === 'left' ? i0 : i1;
      const link = face === 'left' ? i0 : i1 + 1;
      const sign = face === 'left' ? -1 : 1;
      for (let j = j0; j <= j1; j++) {
        const scale = grid.y.width[j]! / grid.dyMetres;
        terms.push({ field: 'u', i, j, sign, from: 'vy', entry: at(link, j), scale });
        terms.push({ field: 'vy', i: link, j, sign, from: 'u', entry: at(i, j), scale: 1 });
      }
    } else {
      const j = face === 'bottom' ? j0 : j1;
      const link = face === 'bottom' ? j0 : j1 + 1;
      const sign = face === 'bottom' ? 1 : -1;
      for (let i = i0; i <= i1; i++) {
        const scale = grid.x.width[i]! / grid.dxMetres;
        terms.push({ field: 'u', i, j, sign, from: 'vx', entry: at(i, link), scale });
        terms.push({ field: 'vx', i, j: link, sign, from: 'u', entry: at(i, j), scale: 1 });
      }
    }
  }
  return terms;
}
