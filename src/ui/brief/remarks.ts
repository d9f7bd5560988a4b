// Owns where in the Brief a remark or an error stands: beside the thing or under the heading it belongs to.
// Must not know how remarks look.
import type { AppError } from '../../base/result.ts';
import type { Remark } from '../../engine/remark.ts';
import type { Job } from '../../model/job.ts';
import { materialRemarks, referenceRemarks } from '../../model/remarks.ts';

export interface Said {
  readonly weight: 'error' | 'remark';
  readonly text: string;
  readonly hint: string | null;
  /** Exact place in the job, when there is one. */
  readonly path: string | null;
}

export type Heading = 'wave' | 'sheet' | 'parts' | 'read' | 'values' | 'stop';

/** What is said, by the id of a thing or by heading. */
export type SaidByPlace = ReadonlyMap<string, readonly Said[]>;

const HEADINGS: Readonly<Record<string, Heading>> = {
  section: 'wave',
  band: 'wave',
  drives: 'wave',
  sheet: 'sheet',
  grid: 'sheet',
  parts: 'parts',
  materials: 'parts',
  probes: 'read',
  reference: 'read',
  values: 'values',
  stop: 'stop',
};

const LISTED = /^(parts|drives|probes|materials)\[(\d+)\]/;

/** Id of the thing a path leads to, or the heading; what has no place of its own stands with the estimate. */
export function placeOf(job: Job, path: string | undefined): string {
  if (path === undefined) return 'sheet';
  const listed = LISTED.exec(path);
  if (listed !== null) {
    const list = job[listed[1] as 'parts' | 'drives' | 'probes' | 'materials'];
    return list[Number(listed[2])]?.id ?? HEADINGS[listed[1] ?? ''] ?? 'sheet';
  }
  const isThing = [...job.parts, ...job.drives, ...job.probes].some((thing) => thing.id === path);
  return isThing ? path : (HEADINGS[/^[a-z]+/.exec(path)?.[0] ?? ''] ?? 'sheet');
}

export function gatherSaid(job: Job, remarks: readonly Remark[], errors: readonly AppError[]): SaidByPlace {
  const said = new Map<string, Said[]>();
  const say = (place: string, item: Said): void => void said.set(place, [...(said.get(place) ?? []), item]);
  for (const { message, hint, path } of errors) {
    say(placeOf(job, path), { weight: 'error', text: message, hint: hint ?? null, path: path ?? null });
  }
  for (const { message, path } of [...remarks, ...materialRemarks(job), ...referenceRemarks(job)]) {
    say(placeOf(job, path), { weight: 'remark', text: message, hint: null, path: path ?? null });
  }
  return said;
}
