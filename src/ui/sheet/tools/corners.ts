// Owns adding a corner to a part of many points and taking one away, under a place on the sheet.
// Must not know the DOM, stores, or menus.
import type { Part, Point, XY } from '../../../model/job.ts';
import { listHandles } from '../../../model/parts/registry.ts';
import { roundTo } from '../snap.ts';
import { snapStep, tidyLength } from '../ticks.ts';
import { RECORD, type ToolAction, type ToolContext } from './tool.ts';

/** A corner or a side this near to the pointer is meant. */
const REACH_PIXELS = 12;
const FEWEST = { wall: 2, polygon: 3, stroke: 1 } as const;

type PointPart = Extract<Part, { points: readonly Point[] }>;
type Place = Pick<ToolContext, 'job' | 'pixelsPerMetre'>;

/** Replaces the part by one with a corner more on the side under `at`; null where no side is. */
export function addCorner(part: Part, at: XY, { job, pixelsPerMetre }: Place): ToolAction | null {
  const corners = cornersOf(part, job.values);
  if (corners === null) return null;
  const sides = part.kind === 'polygon' ? corners.length : corners.length - 1;
  const feet = Array.from({ length: sides }, (_, k) => footOn(corners[k]!, corners[(k + 1) % corners.length]!, at));
  const nearest = nearestOf(feet, at, REACH_PIXELS / pixelsPerMetre);
  if (nearest === null) return null;
  const step = snapStep(pixelsPerMetre) / 10;
  const [x, y] = feet[nearest]!;
  const point: Point = [tidyLength(roundTo(x, step)), tidyLength(roundTo(y, step))];
  return put({ ...(part as PointPart), points: (part as PointPart).points.toSpliced(nearest + 1, 0, point) });
}

/** Replaces the part by one without the corner under `at`; null where none is, or none can be spared. */
export function dropCorner(part: Part, at: XY, { job, pixelsPerMetre }: Place): ToolAction | null {
  const corners = cornersOf(part, job.values);
  if (corners === null || corners.length <= FEWEST[(part as PointPart).kind]) return null;
  const nearest = nearestOf(corners, at, REACH_PIXELS / pixelsPerMetre);
  return nearest === null ? null : put({ ...(part as PointPart), points: (part as PointPart).points.toSpliced(nearest, 1) });
}

function put(item: Part): ToolAction {
  return { do: 'edit', command: { do: 'put', item }, policy: RECORD };
}

/** Null for parts of other kinds, and for those with too many corners to show. */
function cornersOf(part: Part, values: ToolContext['job']['values']): readonly XY[] | null {
  if (!('points' in part)) return null;
  const corners = listHandles(part, values).filter(({ name }) => name.startsWith('point '));
  return corners.length === part.points.length ? corners.map((handle) => handle.at) : null;
}

function footOn(a: XY, b: XY, at: XY): XY {
  const [dx, dy] = [b[0] - a[0], b[1] - a[1]];
  const length = dx * dx + dy * dy;
  const along = length === 0 ? 0 : Math.min(1, Math.max(0, ((at[0] - a[0]) * dx + (at[1] - a[1]) * dy) / length));
  return [a[0] + along * dx, a[1] + along * dy];
}

function nearestOf(places: readonly XY[], at: XY, reach: number): number | null {
  let found: number | null = null;
  let least = reach;
  places.forEach((place, k) => {
    const distance = Math.hypot(place[0] - at[0], place[1] - at[1]);
    if (distance > least) return;
    least = distance;
    found = k;
  });
  return found;
}
