// Owns the corners of a part of many points, each editable where it stands.
// Must not know what the points draw.
import { useViewStore } from '../../app/view-store.ts';
import type { Part, Point } from '../../model/job.ts';
import { setValue } from './editing.ts';
import type { Path } from './path-text.ts';
import { Action } from './ThingLine.tsx';
import { PointValue } from './values.tsx';

/** A freehand stroke has hundreds of points, which no one types. */
const MOST_LISTED = 60;
const FEWEST: Readonly<Record<'wall' | 'polygon' | 'stroke', number>> = { wall: 2, polygon: 3, stroke: 1 };

/** Half way to the next point; what is written stays as it is written. */
function pointAfter(points: readonly Point[], k: number): Point {
  const [a, b] = [points[k]!, points[(k + 1) % points.length]!];
  const half = (n: 0 | 1): string => (a[n] === b[n] ? a[n] : `(${a[n]} + ${b[n]})/2`);
  return [half(0), half(1)];
}

export function PointList({ part, index }: { readonly part: Part; readonly index: number }) {
  const selected = useViewStore((state) => state.selection.includes(part.id));
  if (!selected || !('points' in part)) return null;
  const { points, name } = part;
  if (points.length <= 2 && part.kind !== 'polygon') return null;
  if (points.length > MOST_LISTED) return null;
  const path: Path = ['parts', index, 'points'];
  const fewest = points.length <= FEWEST[part.kind];
  return (
    <span className="point-list">
      {points.map((point, k) => (
        // Points are told apart by their place in the outline and by nothing else.
        // oxlint-disable-next-line react/no-array-index-key
        <span key={k} className="point-item">
          <span className="soft">{k + 1}</span> <PointValue path={[...path, k]} point={point} label={`${name}, point ${k + 1}`} />
          <Action
            label={`Remove point ${k + 1} of ${name}`}
            words="×"
            disabled={fewest}
            onAct={() => void setValue(path, points.toSpliced(k, 1))}
          />
          <Action
            label={`Add a point after point ${k + 1} of ${name}`}
            words="+"
            onAct={() => void setValue(path, points.toSpliced(k + 1, 0, pointAfter(points, k)))}
          />
        </span>
      ))}
    </span>
  );
}
