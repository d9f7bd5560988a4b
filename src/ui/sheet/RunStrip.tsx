// Owns the run strip under the sheet: run, hold, step, pace, progress, and which field is shown how.
// Must not know canvases, workers, or how a run is made.
import { useId, useState, type KeyboardEvent, type ReactElement } from 'react';
import { useShallow } from 'zustand/react/shallow';
import type { FieldView } from '../../../workers/protocol.ts';
import { componentsOf } from '../../app/field-choice.ts';
import { useJobStore } from '../../app/job-store.ts';
import { runActions } from '../../app/run-actions.ts';
import { useRunStore } from '../../app/run-store.ts';
import { useViewStore, type ViewState } from '../../app/view-store.ts';
import { isMagnitude, readScale, unitOf } from './field-image.ts';
import { formatField } from './layers/scale-layer.ts';
import { mainAction, progressShare, progressWords } from './run-words.ts';
import './run-strip.css';

export function RunStrip(): ReactElement {
  return (
    <section className="run-strip" aria-label="Run">
      <RunTroubles />
      <div className="run-strip-row">
        <RunButtons />
        <RunProgressLine />
        <FieldChoice />
      </div>
    </section>
  );
}

function RunButtons(): ReactElement {
  const state = useRunStore((run) => run.progress.state);
  const started = useRunStore((run) => run.progress.step > 0);
  const stale = useRunStore((run) => run.stale);
  const ready = useJobStore((store) => store.resolved.ok);
  const action = mainAction(state, stale);
  const act = { Run: () => runActions.run(), Hold: () => runActions.hold(), Resume: () => runActions.resume() }[action];
  return (
    <>
      <button
        type="button"
        className="main-button run-strip-main"
        disabled={!ready && action !== 'Hold'}
        onClick={() => void act()}
      >
        {action}
      </button>
      <fieldset className="group run-strip-group" aria-label="Time">
        <button
          type="button"
          className="plain-button"
          disabled={state === 'running' || !ready}
          onClick={() => void runActions.stepOnce()}
        >
          one step
        </button>
        <button type="button" className="plain-button" disabled={!started} onClick={() => void runActions.backToStart()}>
          back to t = 0
        </button>
        <button
          type="button"
          className="plain-button"
          disabled={state !== 'running' && state !== 'held'}
          onClick={() => void runActions.stop()}
        >
          stop
        </button>
      </fieldset>
    </>
  );
}

/** Steps a second; watching a wave cross a slot takes a few hundred. */
const PACES: readonly { readonly name: string; readonly stepsPerSecond: number }[] = [
  { name: 'full speed', stepsPerSecond: Infinity },
  { name: '600 steps a second', stepsPerSecond: 600 },
  { name: '200 steps a second', stepsPerSecond: 200 },
  { name: '60 steps a second', stepsPerSecond: 60 },
  { name: '10 steps a second', stepsPerSecond: 10 },
];

function PaceChoice(): ReactElement {
  const [pace, setPace] = useState(0);
  return (
    <select
      className="run-strip-select"
      aria-label="Pace"
      value={pace}
      onChange={(event) => {
        const chosen = Number(event.target.value);
        setPace(chosen);
        void runActions.setPace(PACES[chosen]?.stepsPerSecond ?? Infinity);
      }}
    >
      {PACES.map(({ name }, index) => (
        <option key={name} value={index}>
          {name}
        </option>
      ))}
    </select>
  );
}

function FollowChoice(): ReactElement {
  const follows = useViewStore((state) => state.follows);
  const setFollows = useViewStore((state) => state.setFollows);
  return (
    <label
      className="plain-button run-strip-choice"
      title="A small job is solved again with every edit: the curve follows the hand. Larger ones wait for Run."
    >
      <input type="checkbox" checked={follows} onChange={(event) => setFollows(event.target.checked)} />
      follow edits
    </label>
  );
}

function RunProgressLine(): ReactElement {
  const progress = useRunStore((run) => run.progress);
  const estimate = useRunStore((run) => run.estimate);
  const stale = useRunStore((run) => run.stale);
  const { time, rest } = progressWords(progress, estimate);
  const words = stale && progress.step > 0 ? [...rest, 'the job has changed since'] : rest;
  const decayDb = useJobStore((store) => (store.resolved.ok ? store.resolved.value.stop.decayDb : Infinity));
  const share = progressShare(progress, decayDb);
  return (
    <div className="run-strip-progress">
      <div className="run-strip-words" title={[time, ...words].join(' · ')}>
        <strong>{time}</strong> <span className="soft">{words.map((word) => `· ${word} `)}</span>
      </div>
      <div className="run-strip-under">
        <progress className="run-strip-bar" aria-label="Progress of the run" max={1} value={share} />
        <PaceChoice />
        <FollowChoice />
      </div>
    </div>
  );
}

const MAGNITUDES: readonly FieldView[] = ['|E|', '|H|'];
const PLACES: readonly ViewState['fieldPlace'][] = ['under', 'over', 'off'];

function FieldChoice(): ReactElement {
  const section = useJobStore((store) => store.job.section);
  const { field, setField, fieldPlace, setFieldPlace } = useViewStore(
    useShallow(({ field, setField, fieldPlace, setFieldPlace }) => ({ field, setField, fieldPlace, setFieldPlace })),
  );
  return (
    <div className="run-strip-field">
      <Choice
        label="Field shown"
        chosen={field}
        choose={setField}
        of={[...componentsOf(section), ...MAGNITUDES]}
        write={fieldName}
      />
      <div className="run-strip-under">
        <Choice label="Field, drawing" chosen={fieldPlace} choose={setFieldPlace} of={PLACES} write={(place) => place} />
        {isMagnitude(field) ? <SpanChoice /> : <ScaleField />}
      </div>
    </div>
  );
}

function fieldName(field: FieldView): string {
  return isMagnitude(field) ? `${field} dB` : field;
}

function Choice<T extends string>(props: {
  label: string;
  chosen: T;
  of: readonly T[];
  choose: (value: T) => void;
  write: (value: T) => string;
}): ReactElement {
  const { label, chosen, of, choose, write } = props;
  const name = useId();
  return (
    <fieldset className="group run-strip-group" aria-label={label}>
      {of.map((value) => (
        <label key={value} className="plain-button run-strip-choice">
          <input type="radio" name={name} checked={value === chosen} onChange={() => choose(value)} />
          {write(value)}
        </label>
      ))}
    </fieldset>
  );
}

const SPANS_DB = [20, 40, 60, 80, 100, 120] as const;

function SpanChoice(): ReactElement {
  const span = useViewStore((state) => state.decibelSpan);
  const setSpan = useViewStore((state) => state.setDecibelSpan);
  const spans = [...new Set([...SPANS_DB, span])].sort((a, b) => a - b);
  return (
    <select
      className="run-strip-select"
      aria-label="Span of the colours"
      value={span}
      onChange={(event) => setSpan(Number(event.target.value))}
    >
      {spans.map((db) => (
        <option key={db} value={db}>
          {db} dB
        </option>
      ))}
    </select>
  );
}

/** Empty follows the peak; "2 mV/m", or a bare number in V/m or A/m, holds the scale. */
function ScaleField(): ReactElement {
  const field = useViewStore((state) => state.field);
  const scale = useViewStore((state) => state.fieldScale);
  const setScale = useViewStore((state) => state.setFieldScale);
  const [text, setText] = useState<string | null>(null);
  const [wrong, setWrong] = useState(false);
  const shown = text ?? (scale === null ? '' : formatField(scale, field));

  const commit = (): void => {
    if (text === null) return;
    const read = readScale(text, field);
    setWrong(read === 'wrong');
    if (read === 'wrong') return;
    setScale(read);
    setText(null);
  };
  const onKeyDown = (event: KeyboardEvent<HTMLInputElement>): void => {
    if (event.key === 'Enter') commit();
    if (event.key !== 'Escape') return;
    setText(null);
    setWrong(false);
  };
  return (
    <input
      className="run-strip-scale num"
      aria-label={`Full colour at, in ${unitOf(field)}; empty follows the peak`}
      aria-invalid={wrong}
      title={
        wrong
          ? `Write it like 2 m${unitOf(field)}, or leave it empty to follow the peak.`
          : 'Field at full colour; empty follows the peak'
      }
      placeholder="scale: auto"
      value={shown}
      onChange={(event) => setText(event.target.value)}
      onBlur={commit}
      onKeyDown={onKeyDown}
    />
  );
}

function RunTroubles(): ReactElement | null {
  const errors = useRunStore((run) => run.errors);
  const trouble = useRunStore((run) => run.progress.trouble);
  if (errors.length === 0 && trouble === null) return null;
  return (
    <ul className="run-strip-troubles" role="alert">
      {trouble === null ? null : <li>{trouble}</li>}
      {errors.map((error) => (
        <li key={`${error.path ?? ''} ${error.message}`}>
          {error.message} {error.hint === undefined ? null : <span className="soft">{error.hint}</span>}
        </li>
      ))}
    </ul>
  );
}
