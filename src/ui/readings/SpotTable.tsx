// Owns the table of spot frequencies: values per run, and the list itself, which is part of the job.
// Must not know how curves are computed.
import { useMemo, useState } from 'react';
import { useJobStore } from '../../app/job-store.ts';
import { describeError } from '../../base/result.ts';
import { parseQuantity } from '../../base/quantity.ts';
import { CAUSES } from '../../engine/insertion.ts';
import { makeCurves, readAt, unitOf, type CurveChoice, type DrawnCurve, type DrawnRun } from './curve-data.ts';
import { numberWords } from './scale-words.ts';

export function SpotTable({ runs, choice }: { readonly runs: readonly DrawnRun[]; readonly choice: CurveChoice }) {
  const listed = useJobStore((state) => state.job.band.listed);
  const values = useJobStore((state) => state.job.values);
  const dispatch = useJobStore((state) => state.dispatch);
  const [text, setText] = useState('');
  const [fault, setFault] = useState<string | null>(null);
  const curves = useMemo(() => makeCurves(runs, choice), [runs, choice]);
  const add = (): void => {
    if (text.trim() === '') return;
    const result = dispatch({ do: 'set', path: ['band', 'listed'], value: [...listed, text.trim()] });
    setFault(result.ok ? null : describeError(result.errors[0]));
    if (result.ok) setText('');
  };
  return (
    <div className="spots">
      <table>
        <thead>
          <tr>
            <th scope="col">at</th>
            {curves.map((curve) => (
              <th key={curve.id} scope="col" title={curve.name}>
                {curve.name}
              </th>
            ))}
            <th scope="col">
              <span className="soft">{unitOf(choice)}</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {listed.map((frequency, k) => (
            <tr key={`${frequency} ${k}`}>
              <th scope="row">{frequency}</th>
              {curves.map((curve) => {
                const hertz = parseQuantity(frequency, 'frequency', values);
                return <SpotCell key={curve.id} curve={curve} frequencyHertz={hertz.ok ? hertz.value : null} />;
              })}
              <td className="spot-remove">
                <button
                  className="link-button"
                  aria-label={`Take ${frequency} off the list`}
                  onClick={() => dispatch({ do: 'set', path: ['band', 'listed'], value: listed.filter((_, n) => n !== k) })}
                >
                  ×
                </button>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      <form
        onSubmit={(event) => {
          event.preventDefault();
          add();
        }}
      >
        <input
          className="spot-input"
          aria-label="Add a spot frequency"
          placeholder="+ frequency, e.g. 2.45 GHz"
          value={text}
          aria-invalid={fault !== null}
          onChange={(event) => setText(event.target.value)}
        />
        {fault === null ? null : (
          <span className="spot-fault" role="alert">
            {fault}
          </span>
        )}
      </form>
    </div>
  );
}

function SpotCell({ curve, frequencyHertz }: { readonly curve: DrawnCurve; readonly frequencyHertz: number | null }) {
  const reading = frequencyHertz === null ? null : readAt(curve, frequencyHertz);
  if (reading === null) return <td className="soft">not in this run</td>;
  if (reading.cause !== 0) {
    return (
      <td className="soft" title={CAUSES[reading.cause]}>
        unknown
      </td>
    );
  }
  return <td className="num">{numberWords(reading.db, 2)}</td>;
}
