// Owns when a reference run is worth its time.
// Must not know how runs are made.
import type { Job } from './job.ts';

/** A reference run that leaves out nothing would repeat the run itself. */
export function wantsReference(job: Job): boolean {
  switch (job.reference) {
    case 'none':
      return false;
    case 'empty sheet':
      return job.parts.length > 0;
    case 'without marked parts':
      return job.parts.some((part) => part.leftOutOfReference);
  }
}
