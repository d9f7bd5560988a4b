// Owns which buffers of a report are handed over rather than copied.
// Must not know what they mean.
import { transfer } from 'comlink';
import type { SessionApi } from './protocol.ts';

/** The session with its large answers marked for transfer; what it sends is its own copy already. */
export function transferReports(session: SessionApi): SessionApi {
  return {
    ...session,
    async poll(request) {
      const report = await session.poll(request);
      const buffers: ArrayBuffer[] = report.traces.flatMap((trace) => trace.samples.map((samples) => samples.buffer));
      if (report.frame !== null) buffers.push(report.frame.values.buffer);
      return transfer(report, buffers);
    },
  };
}
