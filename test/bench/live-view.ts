// Owns the cost of watching: steps a session does in a second, unwatched and polled for frames and samples.
import type { Job } from '../../src/model/job.ts';
import { parseJob } from '../../src/model/parse-job.ts';
import { makeNodeSession } from '../../workers/session.node.ts';

function watchedJob(): Job {
  const job = parseJob({
    guidewall: 1,
    section: 'E out of plane',
    band: { from: '1 GHz', to: '15 GHz', points: 201 },
    sheet: { width: '1000 mm', height: '1000 mm' },
    grid: { cells: { x: '1 mm', y: '1 mm' } },
    drives: [{ kind: 'line current', at: ['500 mm', '500 mm'] }],
    probes: [{ at: ['600 mm', '500 mm'] }],
    stop: { decay: 'never', after: '1 us' },
  });
  if (!job.ok) throw new Error(job.errors[0].message);
  return job.value;
}

/** Mcell/s over a second and a half of wall time, polled `framesPerSecond` times a second (0: not at all). */
export async function watchedRate(framesPerSecond: number): Promise<number> {
  const session = makeNodeSession();
  const opened = await session.open(watchedJob(), 'main');
  if (!opened.ok) throw new Error(opened.errors[0].message);
  let best = 0;
  await session.start();
  for (let stretch = 0; stretch < 4; stretch++) {
    const request = { view: null, maxWidth: 0, maxHeight: 0, sinceStep: Infinity };
    const before = (await session.poll(request)).progress.step;
    const start = performance.now();
    let sinceStep = before;
    while (performance.now() - start < 1500) {
      if (framesPerSecond === 0) {
        await new Promise((resolve) => setTimeout(resolve, 1500));
        continue;
      }
      await new Promise((resolve) => setTimeout(resolve, 1000 / framesPerSecond));
      sinceStep = (await session.poll({ view: 'Ez', maxWidth: 1600, maxHeight: 900, sinceStep })).progress.step;
    }
    const steps = (await session.poll(request)).progress.step - before;
    best = Math.max(best, (steps * opened.value.cellsTotal) / (performance.now() - start) / 1000);
  }
  await session.stop();
  return best;
}
