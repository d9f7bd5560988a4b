// Owns one underlined value: at rest a word of the sentence, in hand a field that takes text, spins, commits and bails.
// Must not know what the value means or where it is kept.
import { useId, useRef, useState } from 'react';
import type { KeyboardEvent } from 'react';
import type { AppError } from '../../base/result.ts';
import { keepUnits } from './estimate-words.ts';

export interface ValueEditing {
  /** Null when the text was taken, else why not. `key` joins the edit with those of the same key. */
  commit(text: string, key: string | null): AppError | null;
  /** The text spun by the pressed arrow key, in steps that fit the text spinning began from; null when it cannot be. */
  spin?(text: string, press: KeyboardEvent, begun: string): string | null;
  /** Takes back what was spun under the key. */
  bail(key: string): void;
}

interface EditableValueProps extends ValueEditing {
  /** What is edited. */
  readonly text: string;
  /** What stands in the sentence, when it is shorter than the text. */
  readonly shown?: string;
  /** What the value is, for those who do not see the sentence. */
  readonly label: string;
  readonly className?: string;
  /** Stands for an empty text. */
  readonly placeholder?: string;
}

let sessions = 0;

export function EditableValue(props: EditableValueProps) {
  const { text, shown, label, className = '', placeholder = '\u2026' } = props;
  const [open, setOpen] = useState(false);
  const restRef = useRef<HTMLSpanElement>(null);
  const close = (refocus: boolean): void => {
    setOpen(false);
    if (refocus) requestAnimationFrame(() => restRef.current?.focus());
  };
  if (open) return <ValueField {...props} onClose={close} />;
  const word = shown ?? text;
  return (
    <span
      ref={restRef}
      // A real button is a box of its own in the line: the comma after it would fall to the next line.
      // oxlint-disable-next-line jsx-a11y/prefer-tag-over-role
      role="button"
      tabIndex={0}
      className={`value ${className}`}
      aria-label={`${label}: ${text}`}
      onClick={() => setOpen(true)}
      onKeyDown={(event) => {
        if (event.key !== 'F2' && event.key !== 'Enter' && event.key !== ' ') return;
        event.preventDefault();
        setOpen(true);
      }}
    >
      {word === '' ? placeholder : keepUnits(word)}
    </span>
  );
}

function ValueField(props: EditableValueProps & { onClose(refocus: boolean): void }) {
  const { text, label, commit, spin, bail, onClose } = props;
  const [begun] = useState(text);
  const [draft, setDraft] = useState(text);
  const [error, setError] = useState<AppError | null>(null);
  /** Set while spinning: all spins of one visit are one step of the history. */
  const [key, setKey] = useState<string | null>(null);
  const leaving = useRef(false);
  const errorId = useId();

  const finish = (refocus: boolean): void => {
    const refused = draft.trim() === text.trim() ? null : commit(draft.trim(), key);
    if (refused !== null) return setError(refused);
    leaving.current = true;
    onClose(refocus);
  };
  const turn = (event: KeyboardEvent): void => {
    const spun = spin?.(draft, event, begun) ?? null;
    if (spun === null) return;
    event.preventDefault();
    const joined = key ?? `spin ${(sessions += 1)}`;
    setKey(joined);
    setDraft(spun);
    setError(commit(spun, joined));
  };
  const press = (event: KeyboardEvent): void => {
    // Keys of the text are no keys of the sheet; those with Ctrl go on to the bench.
    if (!event.ctrlKey && !event.metaKey) event.stopPropagation();
    if (event.key === 'Enter') finish(true);
    else if (event.key === 'Escape') {
      leaving.current = true;
      if (key !== null) bail(key);
      onClose(true);
    } else if (event.key === 'ArrowUp' || event.key === 'ArrowDown') turn(event);
  };
  return (
    <span className="value-open">
      <input
        className="value-field"
        aria-label={label}
        aria-invalid={error !== null}
        aria-describedby={error === null ? undefined : errorId}
        value={draft}
        size={Math.max(3, draft.length + 1)}
        spellCheck={false}
        autoComplete="off"
        ref={(field) => {
          if (field === null || field.dataset['begun'] === 'yes') return;
          field.dataset['begun'] = 'yes';
          field.focus();
          field.select();
        }}
        onChange={(event) => {
          setDraft(event.target.value);
          setError(null);
        }}
        onBlur={() => {
          if (!leaving.current) finish(false);
        }}
        onKeyDown={press}
      />
      {error === null ? null : (
        <span className="value-error" id={errorId} role="alert">
          {error.message} {error.hint}
        </span>
      )}
    </span>
  );
}
