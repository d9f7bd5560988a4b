// Owns turning a job into SI numbers, and saying by path what cannot be turned.
// Must not know the grid, the DOM, or who asks.
import type { AppError, Result } from '../base/result.ts';
import { fail, ok } from '../base/result.ts';
import { formatQuantity, makeEvaluator } from '../base/quantity.ts';
import type {
  Drive,
  Job,
  Medium,
  Part,
  ResolvedDrive,
  ResolvedJob,
  ResolvedPart,
  ResolvedWaveform,
  Waveform,
  XY,
} from './job.ts';
import { findMaterial } from './materials/library.ts';
import { isMetal, mediumOf } from './materials/material.ts';
import { makeNumberReader } from './number-reader.ts';
import type { NumberReader } from './number-reader.ts';
import type { DrawnPart } from './parts/part-kind.ts';
import { rulesOf } from './parts/registry.ts';

/** Everything but the outlines and media of parts. Faults go to `reader`. */
function readFrame(
  job: Job,
  reader: NumberReader,
): Omit<ResolvedJob, 'parts' | 'sheet'> & { sheet: Omit<ResolvedJob['sheet'], 'background'> } {
  const cells = job.grid.cells;
  return {
    section: job.section,
    band: {
      fromHertz: reader.read(job.band.from, 'frequency', 'band.from', 'size'),
      toHertz: reader.read(job.band.to, 'frequency', 'band.to', 'size'),
      points: job.band.points,
      listedHertz: job.band.listed.map((text, k) => reader.read(text, 'frequency', `band.listed[${k}]`, 'size')),
    },
    sheet: {
      widthMetres: reader.read(job.sheet.width, 'length', 'sheet.width', 'size'),
      heightMetres: reader.read(job.sheet.height, 'length', 'sheet.height', 'size'),
      originMetres: reader.point(job.sheet.origin, 'sheet.origin'),
      edges: job.sheet.edges,
    },
    grid: {
      cells:
        'perWavelength' in cells
          ? cells
          : {
              xMetres: reader.read(cells.x, 'length', 'grid.cells.x', 'size'),
              yMetres: reader.read(cells.y, 'length', 'grid.cells.y', 'size'),
            },
      absorberCells: job.grid.absorberCells,
      courant: job.grid.courant,
    },
    drives: job.drives.map((drive, k) => readDrive(drive, job.section, reader, `drives[${k}]`)),
    probes: job.probes.map(({ id, name, at }, k) => ({ id, name, at: reader.point(at, `probes[${k}].at`) })),
    reference: job.reference,
    stop: {
      decayDb: job.stop.decay.trim() === 'never' ? Infinity : reader.read(job.stop.decay, 'decibel', 'stop.decay', 'size'),
      afterSeconds: reader.read(job.stop.after, 'time', 'stop.after', 'size'),
    },
  };
}

function readDrive(drive: Drive, section: Job['section'], reader: NumberReader, path: string): ResolvedDrive {
  const { id, name } = drive;
  const waveform = readWaveform(drive.waveform, reader, `${path}.waveform`);
  if (drive.kind === 'plane wave') {
    const amplitude = reader.read(drive.amplitude, 'field', `${path}.amplitude`);
    return { id, name, kind: drive.kind, amplitude, angleRadians: reader.read(drive.angle, 'angle', `${path}.angle`), waveform };
  }
  const amplitude = reader.read(drive.amplitude, section === 'E out of plane' ? 'current' : 'voltage', `${path}.amplitude`);
  return { id, name, kind: drive.kind, at: reader.point(drive.at, `${path}.at`), amplitude, waveform };
}

function readWaveform(waveform: Waveform, reader: NumberReader, path: string): ResolvedWaveform {
  switch (waveform.kind) {
    case 'band pulse':
      return { kind: 'band pulse' };
    case 'continuous wave':
      return { kind: waveform.kind, frequencyHertz: reader.read(waveform.frequency, 'frequency', `${path}.frequency`, 'size') };
    case 'damped step':
      return {
        kind: waveform.kind,
        riseSeconds: reader.read(waveform.rise, 'time', `${path}.rise`, 'size'),
        decaySeconds: reader.read(waveform.decay, 'time', `${path}.decay`, 'size'),
      };
    case 'samples':
      return { kind: waveform.kind, times: waveform.times, values: waveform.values };
  }
}

/** Parts known to read well under the values given: edits share parts, and freehand ones have thousands of points. */
const readableParts = new WeakMap<Part, Job['values']>();

/** Notes every quantity of the job that cannot be read; the relations between values are left to `resolveJob`. */
export function checkQuantities(job: Job, reader: NumberReader): void {
  const evaluate = makeEvaluator(job.values);
  for (const name of Object.keys(job.values)) {
    const result = evaluate(name);
    if (!result.ok) reader.complain({ ...result.errors[0], path: `values.${name}` });
  }
  if (reader.faults.length > 0) return;
  readFrame(job, reader);
  for (const [k, part] of job.parts.entries()) {
    if (readableParts.get(part) === job.values) continue;
    rulesOf(part).check(part, reader, `parts[${k}].`);
    if (reader.faults.length === 0) readableParts.set(part, job.values);
  }
}

function checkRelations(frame: ReturnType<typeof readFrame>, reader: NumberReader): void {
  const { band, sheet } = frame;
  if (band.fromHertz >= band.toHertz) {
    reader.complain({
      code: 'band',
      path: 'band.to',
      message: `The band ends at ${formatQuantity(band.toHertz, 'frequency')}, not above its start ${formatQuantity(band.fromHertz, 'frequency')}.`,
      hint: 'Raise the upper end or lower the start.',
    });
  }
  const left = -sheet.originMetres[0];
  const bottom = -sheet.originMetres[1];
  const slack = 1e-9 * Math.max(sheet.widthMetres, sheet.heightMetres);
  const checkInside = (at: XY, name: string, path: string): void => {
    const inside =
      at[0] >= left - slack &&
      at[0] <= left + sheet.widthMetres + slack &&
      at[1] >= bottom - slack &&
      at[1] <= bottom + sheet.heightMetres + slack;
    if (inside) return;
    const span = (from: number, size: number): string =>
      `${formatQuantity(from, 'length')} to ${formatQuantity(from + size, 'length')}`;
    reader.complain({
      code: 'outside',
      path,
      message: `${name} stands at (${formatQuantity(at[0], 'length')}, ${formatQuantity(at[1], 'length')}), outside the sheet.`,
      hint: `The sheet runs from ${span(left, sheet.widthMetres)} in x and from ${span(bottom, sheet.heightMetres)} in y: move it, or enlarge the sheet.`,
    });
  };
  for (const [k, probe] of frame.probes.entries()) checkInside(probe.at, probe.name, `probes[${k}].at`);
  for (const [k, drive] of frame.drives.entries()) {
    if (drive.kind === 'line current') checkInside(drive.at, drive.name, `drives[${k}].at`);
  }
}

/** Outlines by part, which edits share: a drag redraws one part, not all of them. */
const drawnParts = new WeakMap<Part, { readonly values: Job['values']; readonly drawn: DrawnPart }>();

function drawPart(part: Part, values: Job['values'], reader: NumberReader, path: string): Result<DrawnPart> {
  const kept = drawnParts.get(part);
  if (kept !== undefined && kept.values === values) return ok(kept.drawn);
  const result = rulesOf(part).draw(part, reader, path);
  if (result.ok) drawnParts.set(part, { values, drawn: result.value });
  return result;
}

/** Where materials are evaluated. */
export function bandCentreHertz(band: Pick<ResolvedJob['band'], 'fromHertz' | 'toHertz'>): number {
  return (band.fromHertz + band.toHertz) / 2;
}

function complainOfMaterial(id: string, path: string): AppError {
  return {
    code: 'material',
    path,
    message: `There is no material "${id}".`,
    hint: 'Choose one from the library, or add it to the job\u2019s own materials.',
  };
}

function resolvePart(part: Part, job: Job, centreHertz: number, reader: NumberReader, path: string): ResolvedPart[] {
  const drawn = drawPart(part, job.values, reader, path);
  const material = findMaterial(job, part.material);
  if (!drawn.ok) for (const fault of drawn.errors) reader.complain(fault);
  if (material === undefined) reader.complain(complainOfMaterial(part.material, `${path}material`));
  if (!drawn.ok || material === undefined) return [];
  const { id, name, kind, leftOutOfReference } = part;
  return [
    { id, name, kind, materialId: material.id, medium: mediumOf(material, centreHertz), leftOutOfReference, ...drawn.value },
  ];
}

function resolveBackground(job: Job, centreHertz: number, reader: NumberReader): Medium | null {
  const material = findMaterial(job, job.sheet.background);
  if (material === undefined) {
    reader.complain(complainOfMaterial(job.sheet.background, 'sheet.background'));
    return null;
  }
  if (isMetal(material)) {
    reader.complain({
      code: 'material',
      path: 'sheet.background',
      message: `The sheet is filled with ${material.name}, in which no wave runs.`,
      hint: 'Choose air or a dielectric.',
    });
    return null;
  }
  return mediumOf(material, centreHertz);
}

/** The job in SI numbers, or everything (up to twenty things) that keeps it from having them. */
export function resolveJob(job: Job): Result<ResolvedJob> {
  const reader = makeNumberReader(job.values);
  const frame = readFrame(job, reader);
  if (reader.faults.length === 0) checkRelations(frame, reader);
  const centreHertz = bandCentreHertz(frame.band);
  const background = resolveBackground(job, centreHertz, reader);
  const parts = job.parts.flatMap((part, k) => resolvePart(part, job, centreHertz, reader, `parts[${k}].`));
  const [first, ...others] = reader.faults;
  if (first !== undefined) return fail(first, ...others);
  if (background === null) return fail(complainOfMaterial(job.sheet.background, 'sheet.background'));
  return ok({ ...frame, sheet: { ...frame.sheet, background }, parts });
}
