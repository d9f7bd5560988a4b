// Owns a value chosen from a few words, standing in the sentence like any other value.
// Must not know what is chosen.
import type { ReactNode } from 'react';

interface ChoiceProps<T extends string> {
  readonly label: string;
  readonly value: T;
  readonly options: readonly (readonly [value: T, words: string])[];
  readonly title?: string;
  /** The comma or full stop that must stay on its line. */
  readonly after?: string;
  onChoose(value: T): void;
}

export function Choice<T extends string>({ label, value, options, title, after = '', onChoose }: ChoiceProps<T>) {
  return (
    <ChoiceShell label={label} value={value} title={title} after={after} onChoose={(chosen) => onChoose(chosen as T)}>
      {options.map(([option, words]) => (
        <option key={option} value={option}>
          {words}
        </option>
      ))}
    </ChoiceShell>
  );
}

interface ShellProps {
  readonly label: string;
  readonly value: string;
  readonly title: string | undefined;
  readonly after: string;
  readonly children: ReactNode;
  onChoose(value: string): void;
}

export function ChoiceShell({ label, value, title, after, children, onChoose }: ShellProps) {
  return (
    <span className="choice">
      <select
        className="value value-choice"
        aria-label={label}
        title={title}
        value={value}
        onChange={(event) => onChoose(event.target.value)}
      >
        {children}
      </select>
      {after}
    </span>
  );
}
