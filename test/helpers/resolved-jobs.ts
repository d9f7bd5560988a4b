// Owns small resolved jobs for tests of the engine: numbers only, no document.
import type { EdgeKind, Medium, ResolvedJob, ResolvedPart, XY } from '../../src/model/job.ts';

export const AIR: Medium = { metal: false, epsilonRelative: 1, muRelative: 1, sigma: 0, sigmaMagnetic: 0 };
export const METAL: Medium = { ...AIR, metal: true };

export function edges(left: EdgeKind, right = left, bottom = left, top = left): ResolvedJob['sheet']['edges'] {
  return { left, right, bottom, top };
}

export function rectangle(x0: number, y0: number, x1: number, y1: number): XY[] {
  return [
    [x0, y0],
    [x1, y0],
    [x1, y1],
    [x0, y1],
  ];
}

export function regularPolygon(centre: XY, radius: number, corners: number): XY[] {
  return Array.from({ length: corners }, (_, k): XY => {
    const angle = (2 * Math.PI * k) / corners;
    return [centre[0] + radius * Math.cos(angle), centre[1] + radius * Math.sin(angle)];
  });
}

export function part(id: string, medium: Medium, ...outline: (readonly XY[])[]): ResolvedPart {
  return { id, name: id, kind: 'polygon', materialId: id, medium, leftOutOfReference: true, outline, smallestMetres: Infinity };
}

/** 300 mm by 200 mm of air, 1 to 6 GHz, 20 cells per wavelength, a line current and a probe. */
export function resolvedJob(change: Partial<ResolvedJob> = {}): ResolvedJob {
  return {
    section: 'E out of plane',
    band: { fromHertz: 1e9, toHertz: 6e9, points: 11, listedHertz: [] },
    sheet: { widthMetres: 0.3, heightMetres: 0.2, originMetres: [0, 0], background: AIR, edges: edges('absorbing') },
    grid: { cells: { perWavelength: 20 }, absorberCells: 12, courant: 0.99 },
    parts: [],
    drives: [
      { id: 'drive', name: 'Drive', kind: 'line current', at: [0.1, 0.1], amplitude: 1, waveform: { kind: 'band pulse' } },
    ],
    probes: [{ id: 'probe', name: 'Probe', at: [0.2, 0.11] }],
    reference: 'empty sheet',
    stop: { decayDb: 60, afterSeconds: 10e-9 },
    ...change,
  };
}
