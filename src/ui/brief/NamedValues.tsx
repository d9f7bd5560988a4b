// Owns the named values: `w = 3 mm`, each editable, and adding one.
// Must not know where the names are used.
import { useState } from 'react';
import type { Dimension, NamedValues as Values } from '../../base/quantity.ts';
import { makeEvaluator } from '../../base/quantity.ts';
import type { AppError } from '../../base/result.ts';
import { DIMENSIONS, sameExponents } from '../../base/units.ts';
import { useJobStore } from '../../app/job-store.ts';
import { editQuantity, tryCommand } from './editing.ts';
import { EditableValue } from './EditableValue.tsx';
import { SaidHere } from './SaidHere.tsx';
import { Action } from './ThingLine.tsx';

/** What kind of value a name stands for: decides how it is spun. */
export function dimensionOfValue(name: string, values: Values): Dimension {
  const measure = makeEvaluator(values)(values[name] ?? '');
  if (!measure.ok) return 'length';
  const { exponents } = measure.value;
  return (
    (Object.keys(DIMENSIONS) as Dimension[]).find((dimension) => sameExponents(DIMENSIONS[dimension], exponents)) ?? 'number'
  );
}

export function NamedValues() {
  const values = useJobStore((state) => state.job.values);
  return (
    <section aria-labelledby="brief-values">
      <h2 className="heading" id="brief-values">
        Named values
      </h2>
      <div className="named-values">
        {Object.entries(values).map(([name, text]) => (
          <span key={name} className="named-value num">
            <ValueName name={name} /> ={' '}
            <EditableValue
              text={text}
              label={`Value of ${name}`}
              {...editQuantity(['values', name], dimensionOfValue(name, values))}
            />
            <RemoveName name={name} />
          </span>
        ))}
        <AddName />
      </div>
      <SaidHere place="values" />
    </section>
  );
}

/** The name itself: another one is taken over wherever it is used. */
function ValueName({ name }: { readonly name: string }) {
  return (
    <EditableValue
      text={name}
      label="Name"
      className="value-name"
      commit={(text) => (text.trim() === name ? null : tryCommand({ do: 'rename value', name, to: text.trim() }))}
      bail={() => undefined}
    />
  );
}

function RemoveName({ name }: { readonly name: string }) {
  const [error, setError] = useState<AppError | null>(null);
  return (
    <>
      <Action label={`Remove the name ${name}`} words="×" onAct={() => setError(tryCommand({ do: 'unname value', name }))} />
      {error === null ? null : (
        <span className="value-error" role="alert">
          {error.message} {error.hint}
        </span>
      )}
    </>
  );
}

const ASSIGNMENT = /^\s*([^\s=]+)\s*=\s*(.+?)\s*$/u;

/** One field takes the whole of it: "w = 3 mm". */
function AddName() {
  const commit = (text: string): AppError | null => {
    const match = ASSIGNMENT.exec(text);
    if (match === null) {
      return { code: 'form', message: `"${text}" gives no name and value.`, hint: 'Write it like w = 3 mm.' };
    }
    return tryCommand({ do: 'name value', name: match[1] ?? '', value: match[2] ?? '' });
  };
  return (
    <EditableValue
      text=""
      label="New named value"
      placeholder="+ named value"
      className="value-add"
      commit={commit}
      bail={() => undefined}
    />
  );
}
