// Owns how a value at a place of the job is committed, spun and bailed out of.
// Must not know fields on the screen.
import type { Dimension } from '../../base/quantity.ts';
import { parseQuantity } from '../../base/quantity.ts';
import type { AppError, Result } from '../../base/result.ts';
import type { Command } from '../../model/commands.ts';
import { useJobStore } from '../../app/job-store.ts';
import type { ValueEditing } from './EditableValue.tsx';
import type { Path } from './path-text.ts';
import { makeSpin, spinSteps, spinText } from './spin.ts';

/** Dispatches and answers with the first reason for a refusal, which is then shown at its place and nowhere else. */
export function tryCommand(command: Command, key: string | null = null): AppError | null {
  const { dispatch, dismissRefusal } = useJobStore.getState();
  const done = dispatch(command, key === null ? { kind: 'record' } : { kind: 'join', key });
  if (done.ok) return null;
  dismissRefusal();
  return done.errors[0];
}

export function setValue(path: Path, value: unknown, key: string | null = null): AppError | null {
  return tryCommand({ do: 'set', path, value }, key);
}

const bail = (key: string): void => useJobStore.getState().bail(key);

function makeSpinner(dimension: Dimension, whole: boolean): NonNullable<ValueEditing['spin']> {
  return (text, press, begun) => {
    const spin = makeSpin(begun, dimension, useJobStore.getState().job.values);
    if (spin === null) return null;
    const steps = spinSteps(press);
    if (!whole) return spinText(text, dimension, spin, steps);
    return spinText(text, dimension, { ...spin, step: Math.max(1, spin.step) }, Math.sign(steps) * Math.max(1, Math.abs(steps)));
  };
}

/** A quantity as written: "22.86 mm", "a/2". */
export function editQuantity(path: Path, dimension: Dimension): ValueEditing {
  return { commit: (text, key) => setValue(path, text, key), spin: makeSpinner(dimension, false), bail };
}

/** A bare number, stored as such; an expression is worked out when it is committed. */
export function editNumber(path: Path, whole: boolean): ValueEditing {
  const read = (text: string): Result<number> => parseQuantity(text, 'number', useJobStore.getState().job.values);
  return {
    commit: (text, key) => {
      const value = read(text);
      return value.ok ? setValue(path, value.value, key) : value.errors[0];
    },
    spin: makeSpinner('number', whole),
    bail,
  };
}

export function editText(path: Path): ValueEditing {
  return { commit: (text) => setValue(path, text), bail };
}
