// Owns the curve over frequency: heading, plot, cursors and what they read.
// Must not know uPlot or how curves are computed.
import { useMemo, useState } from 'react';
import { useShallow } from 'zustand/react/shallow';
import { useJobStore } from '../../app/job-store.ts';
import { useViewStore } from '../../app/view-store.ts';
import { CAUSES } from '../../engine/insertion.ts';
import { formatQuantity } from '../../base/quantity.ts';
import {
  makeCurves,
  makeSpectrumColumns,
  readAt,
  unitOf,
  type CurveChoice,
  type DrawnCurve,
  type DrawnRun,
} from './curve-data.ts';
import type { PlotLine } from './plot-content.ts';
import { Plot } from './Plot.tsx';
import { differenceWords } from './difference-words.ts';
import { numberWords } from './scale-words.ts';

interface Props {
  readonly runs: readonly DrawnRun[];
  readonly choice: CurveChoice;
  readonly probeName: string;
  readonly logarithmic: boolean;
}

type Cursors = readonly [number | null, number | null];

export function SpectrumPlot({ runs, choice, probeName, logarithmic }: Props) {
  const theme = useViewStore((state) => state.theme);
  const [cursors, setCursors] = useState<Cursors>([null, null]);
  const curves = useMemo(() => makeCurves(runs, choice), [runs, choice]);
  const columns = useMemo(() => makeSpectrumColumns(curves), [curves]);
  const data = useMemo(() => [...columns.known, ...columns.unknown], [columns]);
  const marks = useJobStore(useShallow((state) => (state.resolved.ok ? state.resolved.value.band.listedHertz : [])));
  const lines = useMemo(
    (): PlotLine[] => [
      ...curves.map(({ name, style }) => ({ name, colour: style.colour, dash: style.dash, width: 2 })),
      ...curves.map(({ name }) => ({ name: `${name}, unknown`, colour: '--soft', dash: [1, 4], width: 1 })),
    ],
    [curves],
  );
  const title = titleOf(choice, probeName);
  const unit = unitOf(choice);
  const note = `${NOTES[choice.quantity]}${curves.length > 0 ? HATCHED : ''}`;
  return (
    <figure className="reading">
      <figcaption>
        <span className="heading">{title}</span>
        <span className="reading-legend">
          {curves.map((curve) => (
            <LegendEntry key={curve.id} curve={curve} />
          ))}
        </span>
        <CursorWords curves={curves} unit={unit} cursors={cursors} onClear={() => setCursors([null, null])} />
      </figcaption>
      {curves.length === 0 ? (
        <div className="plot plot-empty">
          {runs.length === 0 ? 'The curve appears here when a run has ended.' : 'No curve for this choice.'}
        </div>
      ) : (
        <Plot
          label={title}
          wordsAt={(x) => cursorText(curves, unit, x)}
          xUnit="Hz"
          yUnit={unit}
          yPrefixed={false}
          logarithmic={logarithmic}
          lines={lines}
          x={columns.x}
          columns={data}
          floor={columns.floor}
          marks={marks}
          cursors={cursors}
          onCursor={(which, x) => setCursors(([a, b]) => (which === 0 ? [x, b] : [a, x]))}
          theme={theme}
        />
      )}
      <p className="reading-note" title={note}>
        {note}
      </p>
    </figure>
  );
}

/** The caution stands first: it must be seen also where there is room for one line only. */
const NOTES: Readonly<Record<CurveChoice['quantity'], string>> = {
  'insertion ratio':
    'A point of a 2-D model: no shielding effectiveness in the sense of IEEE 299. Field with the parts over the field without them.',
  level: 'Steady field if the drive had, at that frequency alone, the amplitude given in the job.',
  spectrum: 'Spectrum of the record: integral of f(t) exp(−jωt) dt, peak values.',
};
const HATCHED = ' Hatched: hidden by the end of the record or by single precision.';

function titleOf({ quantity, component }: CurveChoice, probeName: string): string {
  return `${quantity} at ${probeName}, ${component}`;
}

function LegendEntry({ curve }: { readonly curve: DrawnCurve }) {
  return (
    <span className="legend-entry">
      <svg width="22" height="6" aria-hidden="true">
        <line
          x1="0"
          x2="22"
          y1="3"
          y2="3"
          stroke={`var(${curve.style.colour})`}
          strokeWidth="2"
          strokeDasharray={curve.style.dash.join(' ')}
        />
      </svg>
      {curve.name}
    </span>
  );
}

interface CursorWordsProps {
  readonly curves: readonly DrawnCurve[];
  readonly unit: string;
  readonly cursors: Cursors;
  readonly onClear: () => void;
}

function CursorWords({ curves, unit, cursors, onClear }: CursorWordsProps) {
  const first = curves[0];
  if (first === undefined) return null;
  if (cursors[0] === null && cursors[1] === null) {
    return <span className="cursor-words soft">Click to read a value, Shift-click for a second one.</span>;
  }
  const readings = cursors.map((cursor) => (cursor === null ? null : readAt(first, cursor)));
  const [a, b] = readings;
  return (
    <output className="cursor-words num">
      {cursors.map((cursor, k) =>
        cursor === null ? null : (
          <span key={k}>
            {formatQuantity(cursor, 'frequency', 5)} · {curves.map((curve) => wordsAt(curve, unit, cursor)).join(' / ')}
          </span>
        ),
      )}
      {a && b ? <span>Δ {differenceWords(a, b)}</span> : null}
      <button className="link-button" onClick={onClear}>
        clear
      </button>
    </output>
  );
}

function cursorText(curves: readonly DrawnCurve[], unit: string, cursor: number): string {
  return `${formatQuantity(cursor, 'frequency', 5)}: ${curves.map((curve) => `${curve.name} ${wordsAt(curve, unit, cursor)}`).join(', ')}`;
}

function wordsAt(curve: DrawnCurve, unit: string, frequencyHertz: number): string {
  const reading = readAt(curve, frequencyHertz);
  if (reading === null) return '–';
  return reading.cause === 0 ? `${numberWords(reading.db, 2)} ${unit}` : `unknown (${CAUSES[reading.cause]})`;
}
