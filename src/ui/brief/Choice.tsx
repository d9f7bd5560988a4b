// Owns a value chosen from a few words, standing in the sentence like any other value.
// Must not know what is chosen.
import type { ReactNode } from 'react';
import { WORD_JOINER } from './EditableValue.tsx';

interface ChoiceProps<T extends string> {
  readonly label: string;
  readonly value: T;
  readonly options: readonly (readonly [value: T, words: string])[];
  readonly title?: string;
  onChoose(value: T): void;
}

export function Choice<T extends string>({ label, value, options, title, onChoose }: ChoiceProps<T>) {
  return (
    <ChoiceShell label={label} value={value} title={title} onChoose={(chosen) => onChoose(chosen as T)}>
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
  readonly children: ReactNode;
  onChoose(value: string): void;
}

export function ChoiceShell({ label, value, title, children, onChoose }: ShellProps) {
  return (
    <>
      <select
        className="value value-choice"
        aria-label={label}
        title={title}
        value={value}
        onChange={(event) => onChoose(event.target.value)}
      >
        {children}
      </select>
      {WORD_JOINER}
    </>
  );
}
