// Owns the trace over time: live while the run goes on, whole when it has ended.
// Must not know uPlot or the session.
import { useMemo, useState } from 'react';
import { useShallow } from 'zustand/react/shallow';
import { CURRENT_LINE } from '../../app/line-styles.ts';
import { useRunStore } from '../../app/run-store.ts';
import { useViewStore } from '../../app/view-store.ts';
import { formatQuantity } from '../../base/quantity.ts';
import { makeTraceColumns, traceOf } from './curve-data.ts';
import { mergeColumns, type Merged } from './merge-columns.ts';
import { nearestIndex } from './nearest-index.ts';
import { Plot } from './Plot.tsx';
import { axisUnit, numberWords } from './scale-words.ts';

/** Points drawn at most: two for each pixel of a wide screen. */
const MOST_POINTS = 4000;

interface Props {
  readonly probeId: string;
  readonly probeName: string;
  /** As chosen for the spectrum; vectors are traced by their components. */
  readonly component: string;
}

export function TracePlot({ probeId, probeName, component }: Props) {
  const theme = useViewStore((state) => state.theme);
  const { components, liveTraces, liveCount, main, progress, estimate } = useRunStore(
    useShallow(({ components, liveTraces, liveCount, main, progress, estimate }) => ({
      components,
      liveTraces,
      liveCount,
      main,
      progress: progress.state,
      estimate,
    })),
  );
  const [cursors, setCursors] = useState<readonly [number | null, number | null]>([null, null]);
  const live = main === null || progress === 'running' || progress === 'held';
  const shown: readonly string[] = main?.components ?? components ?? NO_COMPONENTS;
  const drawn = useMemo(
    () => shown.filter((name) => (component.startsWith('|') ? name.startsWith(component[1]!) : name === component)),
    [shown, component],
  );
  const dtSeconds = live ? (estimate?.dtSeconds ?? 0) : (main?.dtSeconds ?? 0);
  const data = useMemo(() => {
    const traces = live ? liveTraces : (main?.traces ?? []);
    const made = drawn.flatMap((name) => {
      const samples = traceOf(traces, probeId, shown.indexOf(name));
      if (samples === null || dtSeconds === 0) return [];
      return [makeTraceColumns(samples, live ? Math.min(liveCount, samples.length) : samples.length, dtSeconds, MOST_POINTS)];
    });
    return mergeColumns(made);
  }, [live, liveTraces, liveCount, main, drawn, shown, probeId, dtSeconds]);
  const lines = useMemo(
    () =>
      drawn.map((name, k) => ({ name, colour: k === 0 ? CURRENT_LINE.colour : '--c2', dash: k === 0 ? [] : [5, 3], width: 1.4 })),
    [drawn],
  );
  const unit = drawn[0]?.startsWith('E') ? 'V/m' : 'A/m';
  const title = `${drawn.join(', ')} at ${probeName}`;
  return (
    <figure className="reading reading-trace">
      <figcaption>
        <span className="heading">{title}</span>
        <TraceCursorWords x={data.x} columns={data.columns} names={drawn} unit={unit} cursors={cursors} />
      </figcaption>
      {data.x.length < 2 ? (
        <div className="plot plot-empty">The trace appears here while the run goes on.</div>
      ) : (
        <Plot
          label={title}
          wordsAt={(x) => traceWords(data, drawn, unit, x)}
          xUnit="s"
          yUnit={unit}
          yPrefixed
          logarithmic={false}
          lines={lines}
          x={data.x}
          columns={data.columns}
          floor={null}
          marks={NO_MARKS}
          cursors={cursors}
          onCursor={(which, x) => setCursors(([a, b]) => (which === 0 ? [x, b] : [a, x]))}
          theme={theme}
        />
      )}
    </figure>
  );
}

const NO_MARKS: readonly number[] = [];
const NO_COMPONENTS: readonly string[] = [];

interface WordsProps extends Merged {
  readonly names: readonly string[];
  readonly unit: string;
  readonly cursors: readonly [number | null, number | null];
}

function TraceCursorWords({ x, columns, names, unit, cursors }: WordsProps) {
  if (x.length === 0) return null;
  return (
    <span className="cursor-words num">
      {cursors.map((cursor, k) =>
        cursor === null ? null : (
          <span key={k === 0 ? 'first' : 'second'}>{traceWords({ x, columns }, names, unit, cursor)}</span>
        ),
      )}
    </span>
  );
}

function traceWords({ x, columns }: Merged, names: readonly string[], unit: string, cursor: number): string {
  const at = nearestIndex(x, cursor);
  const values = columns.map((column, n) => {
    const value = column[at] ?? 0;
    const scale = axisUnit(value, unit);
    return `${names[n]} ${numberWords(value / scale.factor, 3)} ${scale.unit}`;
  });
  return `${formatQuantity(x[at] ?? 0, 'time', 4)} · ${values.join(', ')}`;
}
