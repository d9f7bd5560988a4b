// Owns the standard sheet on which throughput is measured.
// Must not know how it is measured.
import type { Job } from './job.ts';
import { makeEmptyJob } from './new-job.ts';

const ABSORBER_CELLS = 10;

/** A square of free space, absorbers within `cells` a side, driven by a line current in the middle, with a probe beside it. */
export function makeSpeedJob(cells: number): Job {
  const inner = cells - 2 * ABSORBER_CELLS;
  const side = `${inner} mm`;
  const middle = `${inner / 2} mm`;
  return {
    ...makeEmptyJob(),
    title: `${cells} cells a side`,
    section: 'E out of plane',
    band: { from: '1 GHz', to: '15 GHz', points: 2, listed: [] },
    sheet: {
      width: side,
      height: side,
      origin: [middle, middle],
      background: 'air',
      edges: { left: 'absorbing', right: 'absorbing', bottom: 'absorbing', top: 'absorbing' },
    },
    grid: { cells: { x: '1 mm', y: '1 mm' }, absorberCells: ABSORBER_CELLS, courant: 0.98 },
    drives: [
      {
        id: 'drive-1',
        name: 'Drive 1',
        kind: 'line current',
        at: ['0 mm', '0 mm'],
        amplitude: '1 A',
        waveform: { kind: 'band pulse' },
      },
    ],
    probes: [{ id: 'probe-1', name: 'Probe 1', at: ['20 mm', '0 mm'] }],
    reference: 'none',
    stop: { decay: 'never', after: '10 us' },
  };
}
