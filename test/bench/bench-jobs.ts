// Owns the jobs the bench times: resolved jobs of chosen size and content, made of numbers alone.
import type { Medium, ResolvedJob, ResolvedPart, Section, XY } from '../../src/model/job.ts';

const AIR: Medium = { metal: false, epsilonRelative: 1, muRelative: 1, sigma: 0, sigmaMagnetic: 0 };
const CELL = 1e-3;

interface Choice {
  readonly cellsX: number;
  readonly cellsY: number;
  readonly section: Section;
  readonly parts: readonly ResolvedPart[];
  readonly probes: number;
  readonly points: number;
}

/** An open sheet of 1 mm cells with CPML on four sides and a line current in the middle. */
export function benchJob(choice: Partial<Choice>): ResolvedJob {
  const { cellsX = 1000, cellsY = 1000, section = 'E out of plane', parts = [], probes = 1, points = 2 } = choice;
  const width = cellsX * CELL;
  const height = cellsY * CELL;
  return {
    section,
    band: { fromHertz: 1e9, toHertz: 15e9, points, listedHertz: [] },
    sheet: {
      widthMetres: width,
      heightMetres: height,
      originMetres: [0, 0],
      background: AIR,
      edges: { left: 'absorbing', right: 'absorbing', bottom: 'absorbing', top: 'absorbing' },
    },
    grid: { cells: { xMetres: CELL, yMetres: CELL }, absorberCells: 12, courant: 0.99 },
    parts,
    drives: [
      {
        id: 'drive',
        name: 'Drive',
        kind: 'line current',
        at: [width / 2, height / 2],
        amplitude: 1,
        waveform: { kind: 'band pulse' },
      },
    ],
    probes: Array.from({ length: probes }, (_, k) => ({
      id: `p${k}`,
      name: `P${k}`,
      at: [width * (0.55 + 0.1 * k), height * 0.6] as XY,
    })),
    reference: 'none',
    stop: { decayDb: Infinity, afterSeconds: 1e-6 },
  };
}

/** Slanted strips over the lower `share` of a square sheet: their borders keep those rows mixed. */
export function diagonalPart(choice: { cells: number; share: number; medium: Partial<Medium> }): ResolvedPart {
  const side = choice.cells * CELL;
  const top = side * choice.share;
  // A saw of slanted strips: every row is cut many times, so that hardly any run of cells is plain.
  const strips = 40;
  const outline = Array.from({ length: strips }, (_, k): XY[] => {
    const x = (side * k) / strips;
    const w = side / strips / 2;
    return [
      [x, 0],
      [x + w, 0],
      [x + 1.5 * w, top],
      [x + 0.5 * w, top],
    ];
  });
  return {
    id: 'saw',
    name: 'Saw',
    kind: 'polygon',
    materialId: 'bench',
    medium: { ...AIR, epsilonRelative: 2.2, ...choice.medium },
    leftOutOfReference: false,
    outline,
    smallestMetres: side / strips / 2,
  };
}
