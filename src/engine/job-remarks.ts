// Owns what should be said of a job that can be run: too few cells, things that stand where they do or read nothing.
// Must not know documents, screens, or how the run is made.
import { partContains } from '../model/outline.ts';
import type { ResolvedJob, XY } from '../model/job.ts';
import type { Grid } from './grid.ts';
import type { Launch } from './plane-wave.ts';
import type { Remark } from './remark.ts';

export function jobRemarks(
  job: ResolvedJob,
  grid: Grid,
  launches: ReadonlyMap<string, Launch>,
  cellsPerShortestWavelength: number,
): Remark[] {
  return [
    ...resolutionRemarks(job, grid, cellsPerShortestWavelength),
    ...partRemarks(job),
    ...probeRemarks(job, grid, launches),
    ...driveRemarks(job),
    ...bandRemarks(job),
  ];
}

function resolutionRemarks(job: ResolvedJob, grid: Grid, cellsPerShortestWavelength: number): Remark[] {
  const remarks: Remark[] = [];
  if (cellsPerShortestWavelength < 10) {
    remarks.push({
      code: 'coarse grid',
      path: 'grid.cells',
      message: `Only ${cellsPerShortestWavelength.toFixed(1)} cells per shortest wavelength: below 10 the wave is visibly slow; 20 is usual (common practice).`,
    });
  }
  const cell = Math.max(grid.dxMetres, grid.dyMetres);
  for (const part of job.parts) {
    if (part.smallestMetres >= 2 * cell) continue;
    const cells = part.smallestMetres / cell;
    remarks.push({
      code: 'part near cell size',
      path: part.id,
      message: `${part.name} is ${(part.smallestMetres * 1e3).toPrecision(3)} mm across, ${cells.toFixed(1)} cells of ${(cell * 1e3).toPrecision(3)} mm: ${
        job.parts.some((other) => other.medium.metal)
          ? 'edges of metal are moved to the nearest grid line, so its width is rounded to whole cells'
          : 'it is averaged into its cells'
      }. Take smaller cells to resolve it.`,
    });
  }
  return remarks;
}

function probeRemarks(job: ResolvedJob, grid: Grid, launches: ReadonlyMap<string, Launch>): Remark[] {
  const remarks: Remark[] = job.probes
    .filter((probe) => isInMetal(job, probe.at))
    .map((probe) => ({
      code: 'probe in metal',
      path: probe.id,
      message: `${probe.name} stands in metal, where every field is zero. Move it into the open.`,
    }));
  for (const launch of launches.values()) {
    const { x, y } = grid;
    for (const probe of job.probes) {
      const px = probe.at[0] + job.sheet.originMetres[0];
      const py = probe.at[1] + job.sheet.originMetres[1];
      const inside =
        px >= x.position[launch.i0]! &&
        px <= x.position[launch.i1]! &&
        py >= y.position[launch.j0]! &&
        py <= y.position[launch.j1]!;
      // Over the full height the sides of the sheet are not faces.
      const aside =
        launch.kind === 'full height' && (launch.faces[0] === 'left' || launch.faces[0] === 'right')
          ? px >= x.position[launch.i0]! && px <= x.position[launch.i1]!
          : py >= y.position[launch.j0]! && py <= y.position[launch.j1]!;
      if (launch.kind === 'box' ? inside : aside) continue;
      remarks.push({
        code: 'probe in scattered field',
        path: probe.id,
        message: `${probe.name} stands outside the total field: it reads the scattered (reflected) field only.`,
      });
    }
  }
  return remarks;
}

function partRemarks(job: ResolvedJob): Remark[] {
  const [left, bottom] = [-job.sheet.originMetres[0], -job.sheet.originMetres[1]];
  const [right, top] = [left + job.sheet.widthMetres, bottom + job.sheet.heightMetres];
  const outside = job.parts.filter(({ outline }) => {
    const points = outline.flat();
    const all = (test: (at: XY) => boolean): boolean => points.every(test);
    return all(([x]) => x <= left) || all(([x]) => x >= right) || all(([, y]) => y <= bottom) || all(([, y]) => y >= top);
  });
  return outside.map((part) => ({
    code: 'part outside',
    path: part.id,
    message: `${part.name} lies wholly outside the sheet and does nothing. Move it, or enlarge the sheet.`,
  }));
}

/** True when the topmost part at a place is metal. */
function isInMetal(job: ResolvedJob, at: XY): boolean {
  return job.parts.findLast((part) => partContains(part.outline, at[0], at[1]))?.medium.metal === true;
}

function driveRemarks(job: ResolvedJob): Remark[] {
  const [first, ...others] = job.drives;
  if (first === undefined || others.every((drive) => JSON.stringify(drive.waveform) === JSON.stringify(first.waveform)))
    return [];
  return [
    {
      code: 'several waveforms',
      path: first.id,
      message: `The drives have different waveforms: levels are read against that of ${first.name}; insertion ratios are those of all together.`,
    },
  ];
}

function bandRemarks({ band, drives }: ResolvedJob): Remark[] {
  const gigahertz = (hertz: number): string => `${Number((hertz / 1e9).toPrecision(6))} GHz`;
  const span = `${gigahertz(band.fromHertz)} to ${gigahertz(band.toHertz)}`;
  const isOutside = (hertz: number): boolean => hertz < band.fromHertz * (1 - 1e-9) || hertz > band.toHertz * (1 + 1e-9);
  const listed = band.listedHertz.filter(isOutside);
  const remarks: Remark[] = [];
  if (listed.length > 0) {
    remarks.push({
      code: 'listed outside band',
      path: 'band.listed',
      message: `${listed.map(gigahertz).join(', ')}: outside the band of ${span}, where the drive has little to say and the cells are not chosen for it.`,
    });
  }
  for (const { id, name, waveform } of drives) {
    if (waveform.kind !== 'continuous wave' || !isOutside(waveform.frequencyHertz)) continue;
    remarks.push({
      code: 'continuous wave outside band',
      path: id,
      message: `${name} swings at ${gigahertz(waveform.frequencyHertz)}, outside the band of ${span}: no spectrum is read there and the cells are not chosen for it.`,
    });
  }
  return remarks;
}
