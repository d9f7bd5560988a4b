// Owns a small job for tests: a wall left out of the reference, a board that stays, one probe.
// Must not know what is tested with it.
import { parseJob } from '../../../src/model/parse-job.ts';
import type { Job } from '../../../src/model/job.ts';

export function makeSmallJob(): Job {
  const parsed = parseJob({
    guidewall: 1,
    title: 'Small',
    section: 'E out of plane',
    band: { from: '1 GHz', to: '6 GHz' },
    sheet: { width: '180 mm', height: '90 mm' },
    values: { w: '3 mm' },
    parts: [
      {
        id: 'wall-1',
        name: 'Wall A',
        kind: 'wall',
        points: [
          ['90 mm', '20 mm'],
          ['90 mm', '60 mm'],
        ],
        thickness: '2 mm',
        leftOutOfReference: true,
      },
      { id: 'board', name: 'Board', kind: 'rectangle', material: 'fr-4', from: ['120 mm', '30 mm'], to: ['124 mm', '60 mm'] },
    ],
    drives: [{ id: 'wave', name: 'Wave', kind: 'plane wave' }],
    probes: [{ id: 'probe-1', name: 'Probe 1', at: ['150 mm', '45 mm'] }],
  });
  if (!parsed.ok) throw new Error(parsed.errors[0].message);
  return parsed.value;
}
