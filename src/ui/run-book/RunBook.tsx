// Owns the run book: the run on show, the kept ones, laying them over each other.
// Must not know how runs are stored or how curves are drawn.
import { useState } from 'react';
import { CURRENT_LINE, lineStyleOfKept } from '../../app/line-styles.ts';
import { describeKept } from '../../app/run-book.ts';
import { runActions } from '../../app/run-actions.ts';
import type { KeptRun } from '../../app/run-store.ts';
import { useRunStore } from '../../app/run-store.ts';
import { LineSample } from './LineSample.tsx';
import './run-book.css';
import { describeCurrent, describeMoment, describeRecord } from './run-words.ts';

export function RunBook() {
  const kept = useRunStore((state) => state.kept);
  return (
    <section className="run-book" aria-labelledby="run-book-heading">
      <h2 className="heading" id="run-book-heading">
        Run book
      </h2>
      <CurrentRun />
      <ul className="kept-runs">
        {kept.map((run) => (
          <KeptLine key={run.id} run={run} changes={describeKept(kept, run.id)} />
        ))}
      </ul>
      <ReferenceWords />
    </section>
  );
}

function CurrentRun() {
  const words = useRunStore((state) => describeCurrent(state.progress, state.main !== null, state.stale));
  const title = useRunStore((state) => state.answeredJob?.title ?? 'This run');
  const record = useRunStore((state) => state.main);
  const isKept = useRunStore((state) => state.kept.some((run) => run.main === state.main));
  return (
    <div className="run-card">
      <p className="run-name">
        <LineSample style={CURRENT_LINE} />
        <strong>{title === '' ? 'This run' : title}</strong>
      </p>
      <p className="soft">{words}</p>
      <button type="button" className="plain-button" disabled={record === null || isKept} onClick={() => runActions.keep()}>
        {isKept ? 'kept' : 'keep this run'}
      </button>
    </div>
  );
}

function KeptLine({ run, changes }: { readonly run: KeptRun; readonly changes: string | null }) {
  const { id, name, overlaid } = run;
  return (
    <li className="run-card" data-overlaid={overlaid}>
      <p className="run-name">
        <label className="overlay-switch" title={overlaid ? 'Drawn over the run on show' : 'Not drawn'}>
          <input
            type="checkbox"
            checked={overlaid}
            aria-label={`Draw ${name} over the run on show`}
            onChange={(event) => runActions.overlayKept(id, event.target.checked)}
          />
          <LineSample style={lineStyleOfKept(id)} />
        </label>
        <RunName run={run} />
      </p>
      <p className="soft" title={describeRecord(run.main)}>
        {changes === null || changes === name ? null : `${changes}; `}kept {describeMoment(run.keptAt)}
      </p>
      <p className="run-actions">
        <button type="button" className="action" aria-label={`Reopen ${name}`} onClick={() => runActions.reopenKept(id)}>
          reopen
        </button>
        <button type="button" className="action" aria-label={`Remove ${name}`} onClick={() => runActions.removeKept(id)}>
          remove
        </button>
      </p>
    </li>
  );
}

function RunName({ run }: { readonly run: KeptRun }) {
  const [draft, setDraft] = useState<string | null>(null);
  const commit = (): void => {
    if (draft !== null) runActions.renameKept(run.id, draft);
    setDraft(null);
  };
  return (
    <input
      className="run-title"
      aria-label={`Name of the run ${run.name}`}
      value={draft ?? run.name}
      title={run.name}
      maxLength={80}
      spellCheck={false}
      onChange={(event) => setDraft(event.target.value)}
      onBlur={commit}
      onKeyDown={(event) => {
        if (event.key === 'Enter') event.currentTarget.blur();
        if (event.key === 'Escape') setDraft(null);
      }}
    />
  );
}

const REFERENCE_WORDS = {
  none: null,
  running: 'The reference run is under way.',
  done: 'The reference run is done.',
  failed: 'The reference run failed; the errors stand in the Brief.',
} as const;

function ReferenceWords() {
  const words = useRunStore((state) => REFERENCE_WORDS[state.referenceState]);
  return words === null ? null : <output className="soft reference-words">{words}</output>;
}
