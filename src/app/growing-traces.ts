// Owns the samples of a run under way: one growing buffer per probe and component, fed by reports.
// Must not know workers, stores, or how traces are drawn.
import type { ProbeTrace, SessionReport } from '../../workers/protocol.ts';

type Samples = Float32Array<ArrayBuffer>;

const FIRST_ROOM = 4096;

export class GrowingTraces {
  /** Valid samples in each buffer. */
  count = 0;
  /** A new array whenever a buffer has moved, so that readers may keep views until then. */
  traces: readonly ProbeTrace[] = [];

  /** Takes the samples of a report in at `sinceStep`; a report that starts again from 0 replaces what was there. */
  append(report: Pick<SessionReport, 'traces' | 'sinceStep'>): void {
    const first = report.traces[0];
    if (first === undefined) return;
    const at = Math.min(report.sinceStep, this.count);
    const added = first.samples[0].length;
    const same =
      this.traces.length === report.traces.length && this.traces.every((trace, p) => trace.probeId === report.traces[p]?.probeId);
    const end = at + added;
    if (!same || this.room() < end) this.makeRoom(report.traces, end, same);
    for (const [p, trace] of report.traces.entries()) {
      for (const [k, samples] of trace.samples.entries()) this.traces[p]?.samples[k]?.set(samples, at);
    }
    this.count = end;
  }

  private room(): number {
    return this.traces[0]?.samples[0].length ?? 0;
  }

  private makeRoom(like: readonly ProbeTrace[], least: number, keep: boolean): void {
    let room = Math.max(FIRST_ROOM, this.room());
    while (room < least) room *= 2;
    const grow = (old: Samples | undefined): Samples => {
      const grown = new Float32Array(room);
      if (keep && old !== undefined) grown.set(old.subarray(0, this.count));
      return grown;
    };
    const old = this.traces;
    this.traces = like.map(({ probeId }, p) => {
      const from = old[p]?.samples;
      return { probeId, samples: [grow(from?.[0]), grow(from?.[1]), grow(from?.[2])] as const };
    });
  }
}
