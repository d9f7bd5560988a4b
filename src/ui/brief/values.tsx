// Owns the kinds of values a sentence can hold: a quantity, a point, a number, a name.
// Must not know any sentence.
import type { Dimension } from '../../base/quantity.ts';
import { useJobStore } from '../../app/job-store.ts';
import type { Point } from '../../model/job.ts';
import { editNumber, editQuantity, editText } from './editing.ts';
import { EditableValue } from './EditableValue.tsx';
import type { Path } from './path-text.ts';
import { writePath } from './path-text.ts';

interface PlaceProps {
  readonly path: Path;
  readonly label: string;
}

/** True when the value reads well and yet makes no sense where it stands; the words for it stand under the sentence. */
function useFault(path: string): boolean {
  return useJobStore((state) => !state.resolved.ok && state.resolved.errors.some((error) => error.path === path));
}

interface QuantityProps extends PlaceProps {
  readonly text: string;
  readonly shown?: string;
  readonly dimension: Dimension;
}

export function QuantityValue({ path, text, shown, label, dimension }: QuantityProps) {
  const faulty = useFault(writePath(path));
  return (
    <EditableValue
      text={text}
      shown={shown ?? text}
      label={label}
      className={faulty ? 'value-fault' : ''}
      {...editQuantity(path, dimension)}
    />
  );
}

const PLAIN_LENGTH = /^\s*([-+]?[\d.]+(?:[eE][-+]?\d+)?)\s*(nm|\u00b5m|um|mm|cm|m|in|mil|ft)\s*$/u;

/** "(440, 145) mm" when both are plain and in one unit; the whole texts otherwise. */
export function shortenPoint([x, y]: Point): { readonly x: string; readonly y: string; readonly unit: string } {
  const [a, b] = [PLAIN_LENGTH.exec(x), PLAIN_LENGTH.exec(y)];
  const unit = a?.[2];
  if (a === null || b === null || unit === undefined || unit !== b[2]) return { x, y, unit: '' };
  return { x: a[1] ?? x, y: b[1] ?? y, unit: ` ${unit}` };
}

export function PointValue({ path, point, label }: PlaceProps & { readonly point: Point }) {
  const { x, y, unit } = shortenPoint(point);
  return (
    <span className="point" data-short={unit !== ''}>
      (<QuantityValue path={[...path, 0]} text={point[0]} shown={x} label={`${label}, x`} dimension="length" />,{' '}
      <QuantityValue path={[...path, 1]} text={point[1]} shown={y} label={`${label}, y`} dimension="length" />){unit}
    </span>
  );
}

export function NumberValue({
  path,
  value,
  label,
  whole = false,
}: PlaceProps & { readonly value: number; readonly whole?: boolean }) {
  return <EditableValue text={String(value)} label={label} {...editNumber(path, whole)} />;
}

export function NameValue({ path, text, label }: PlaceProps & { readonly text: string }) {
  return <EditableValue text={text} label={label} className="value-name" placeholder="unnamed" {...editText(path)} />;
}
