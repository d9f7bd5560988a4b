// Owns keeping the identity of what an edit did not change, so that caches and screens see only what did.
// Must not know how edits are made.
import type { Job } from './job.ts';

function isObject(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

/** `after`, made of the pieces of `before` wherever the two are equal; `before` itself when they are equal throughout. */
function shareStructure<T>(before: unknown, after: T): T {
  if (Object.is(before, after)) return after;
  if (Array.isArray(before) && Array.isArray(after)) {
    const shared = after.map((item: unknown, k) => shareStructure(before[k], item));
    const same = before.length === shared.length && shared.every((item, k) => Object.is(item, before[k]));
    return (same ? before : shared) as T;
  }
  if (isObject(before) && isObject(after)) {
    const keys = Object.keys(after);
    const shared = Object.fromEntries(keys.map((key) => [key, shareStructure(before[key], after[key])]));
    const same =
      Object.keys(before).length === keys.length &&
      keys.every((key) => Object.hasOwn(before, key) && Object.is(shared[key], before[key]));
    return (same ? before : shared) as T;
  }
  return after;
}

/** As `shareStructure`, for lists of things with ids: a thing is matched with its former self wherever it stood. */
function shareById<T extends { readonly id: string }>(before: readonly T[], after: readonly T[]): readonly T[] {
  const former = new Map(before.map((item) => [item.id, item]));
  const shared = after.map((item) => shareStructure(former.get(item.id), item));
  const same = before.length === shared.length && shared.every((item, k) => item === before[k]);
  return same ? before : shared;
}

export function shareJob(before: Job, after: Job): Job {
  return shareStructure(before, {
    ...after,
    parts: shareById(before.parts, after.parts),
    drives: shareById(before.drives, after.drives),
    probes: shareById(before.probes, after.probes),
    materials: shareById(before.materials, after.materials),
  });
}
