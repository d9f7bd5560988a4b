// Owns the fingerprint of a job: equal jobs have equal hashes on every platform, whatever the order of their keys.
// Must not know files or runs.
import { sha256 } from '../base/sha256.ts';
import type { Job } from './job.ts';

/** JSON with the keys of every object in rising order of their code units. */
function writeCanonical(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(writeCanonical).join(',')}]`;
  if (typeof value !== 'object' || value === null) return JSON.stringify(value);
  const entries = Object.entries(value).toSorted(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0));
  return `{${entries.map(([key, item]) => `${JSON.stringify(key)}:${writeCanonical(item)}`).join(',')}}`;
}

/** SHA-256 of the whole document, hex. */
export function hashJob(job: Job): string {
  return sha256(writeCanonical(job));
}
