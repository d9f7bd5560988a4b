// Owns finding the things of a job on the sheet: what lies under a point or in a band, in which order, and their names.
// Must not know the DOM, stores, or tools.
import type { Job, Part, ResolvedJob, ResolvedPart, XY } from '../../model/job.ts';
import { outlineBounds, partContains } from '../../model/outline.ts';
import { planeWaveFront } from './layers/drives-layer.ts';
import { sheetBox } from './layers/edges-layer.ts';
import { distanceToSegment } from '../../model/segment.ts';
import type { Box } from './viewport.ts';

/** A thing is under the pointer within this distance of its line or point. */
const REACH_PIXELS = 6;
const SIGN_REACH_PIXELS = 11;
const POLE_PIXELS = 28;

/** The topmost thing under a point: probes, then drives, then parts from the top of the painting order. */
export function thingAt(job: ResolvedJob, at: XY, pixelsPerMetre: number): string | null {
  const sign = SIGN_REACH_PIXELS / pixelsPerMetre;
  const reach = REACH_PIXELS / pixelsPerMetre;
  for (const probe of job.probes.toReversed()) {
    const top: XY = [probe.at[0], probe.at[1] + POLE_PIXELS / pixelsPerMetre];
    const flag: XY = [probe.at[0] + sign, top[1] - sign * 0.6];
    if (distanceToSegment(at, probe.at, top) < reach || distance(at, flag) < sign) return probe.id;
  }
  for (const drive of job.drives.toReversed()) {
    if (drive.kind === 'line current' && distance(at, drive.at) < sign) return drive.id;
  }
  for (const part of job.parts.toReversed()) if (touches(part, at, reach)) return part.id;
  for (const drive of job.drives.toReversed()) {
    if (drive.kind !== 'plane wave') continue;
    const [from, to] = planeWaveFront(sheetBox(job.sheet), drive.angleRadians);
    if (distanceToSegment(at, from, to) < reach) return drive.id;
  }
  return null;
}

function touches(part: ResolvedPart, at: XY, reach: number): boolean {
  if (partContains(part.outline, at[0], at[1])) return true;
  return part.outline.some((ring) =>
    ring.some((from, k) => distanceToSegment(at, from, ring[(k + 1) % ring.length] ?? from) < reach),
  );
}

function distance(p: XY, q: XY): number {
  return Math.hypot(p[0] - q[0], p[1] - q[1]);
}

/** Everything that lies wholly inside a box. */
export function thingsInBox(job: ResolvedJob, box: Box): readonly string[] {
  const inside = (left: number, right: number, bottom: number, top: number): boolean =>
    left >= box.left && right <= box.right && bottom >= box.bottom && top <= box.top;
  const parts = job.parts.filter(({ outline }) => {
    const bounds = outlineBounds(outline);
    return inside(bounds.left, bounds.right, bounds.bottom, bounds.top);
  });
  const signs = [...job.drives, ...job.probes].filter(
    (thing) => 'at' in thing && inside(thing.at[0], thing.at[0], thing.at[1], thing.at[1]),
  );
  return [...parts, ...signs].map((thing) => thing.id);
}

/** Ids in the order in which Tab visits them: the Brief's order. */
export function thingIds(job: Job): readonly string[] {
  return [...job.drives, ...job.parts, ...job.probes].map((thing) => thing.id);
}

export function nameOf(job: Job, id: string): string {
  return [...job.drives, ...job.parts, ...job.probes].find((thing) => thing.id === id)?.name ?? id;
}

export function findPart(job: Job, id: string | undefined): Part | null {
  return job.parts.find((part) => part.id === id) ?? null;
}

/** A plane wave has no place to move. */
export function canMove(job: Job, id: string): boolean {
  return job.drives.every((drive) => drive.id !== id || drive.kind === 'line current');
}

/** Points by which a thing is moved precisely: its corners, or its place. */
export function keyPoints(job: ResolvedJob, id: string): readonly XY[] {
  const part = job.parts.find((candidate) => candidate.id === id);
  if (part === undefined) {
    const sign = [...job.drives, ...job.probes].find((thing) => thing.id === id);
    return sign !== undefined && 'at' in sign ? [sign.at] : [];
  }
  const { left, right, bottom, top } = outlineBounds(part.outline);
  const middle: XY = [(left + right) / 2, (bottom + top) / 2];
  const corners = part.outline.filter((ring) => ring.length <= 24).flat();
  return [middle, ...corners];
}

export function nearestOf(points: readonly XY[], at: XY): XY {
  let best = points[0] ?? at;
  for (const point of points) if (distance(point, at) < distance(best, at)) best = point;
  return best;
}
