// Owns the numbers of the dimensions over the canvas: buttons that open as fields where they stand.
// Must not know how dimensions are drawn or measured.
import { useEffect, useRef, useState, type KeyboardEvent, type ReactElement } from 'react';
import { useJobStore } from '../../app/job-store.ts';
import type { AppError } from '../../base/result.ts';
import { setDimension } from '../../model/parts/registry.ts';
import { withUnit, type DimensionChip } from './sheet-overlay.ts';
import { findPart } from './things.ts';

interface Props {
  readonly chips: readonly DimensionChip[];
  readonly editing: number | null;
  readonly edit: (index: number | null) => void;
}

export function DimensionChips({ chips, editing, edit }: Props): ReactElement {
  return (
    <>
      {chips.map((chip, index) => (
        <div key={`${chip.partId} ${chip.name}`} className="sheet-chip" style={{ left: chip.x, top: chip.y }} data-chrome>
          {editing === index ? (
            <DimensionField chip={chip} close={() => edit(null)} next={() => edit((index + 1) % chips.length)} />
          ) : (
            <button type="button" aria-label={`${chip.name}: ${chip.label}. Edit`} onClick={() => edit(index)}>
              {chip.label}
            </button>
          )}
        </div>
      ))}
    </>
  );
}

function DimensionField({ chip, close, next }: { chip: DimensionChip; close: () => void; next: () => void }): ReactElement {
  const field = useRef<HTMLInputElement>(null);
  const [text, setText] = useState(chip.text);
  const [problem, setProblem] = useState<string | null>(null);
  useEffect(() => field.current?.select(), []);

  const commit = (then: () => void): void => {
    const refused = text.trim() === chip.text ? null : writeDimension(chip, text);
    if (refused === null) then();
    else setProblem(refused);
  };
  const onKeyDown = (event: KeyboardEvent): void => {
    if (!['Enter', 'Escape', 'Tab'].includes(event.key)) return;
    event.preventDefault();
    event.stopPropagation();
    if (event.key === 'Escape') close();
    else commit(event.key === 'Tab' ? next : close);
  };
  return (
    <>
      <input
        ref={field}
        aria-label={chip.name}
        aria-invalid={problem !== null}
        value={text}
        size={Math.max(6, text.length)}
        onChange={(event) => {
          setText(event.target.value);
          setProblem(null);
        }}
        onKeyDown={onKeyDown}
      />
      {problem === null ? null : (
        <div className="sheet-problem" role="alert">
          {problem}
        </div>
      )}
    </>
  );
}

/** Null when it went into the job; otherwise why not, and the mend. */
function writeDimension(chip: DimensionChip, text: string): string | null {
  const { job, dispatch } = useJobStore.getState();
  const part = findPart(job, chip.partId);
  if (part === null) return null;
  const made = setDimension(part, chip.name, withUnit(text, chip.text), job.values);
  if (!made.ok) return inWords(made.errors[0]);
  const done = dispatch({ do: 'put', item: made.value });
  return done.ok ? null : inWords(done.errors[0]);
}

function inWords(error: AppError): string {
  return error.hint === undefined ? error.message : `${error.message} ${error.hint}`;
}
