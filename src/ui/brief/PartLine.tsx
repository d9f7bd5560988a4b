// Owns the sentence of one part, and the short row it folds into when there are many.
// Must not know any kind of part.
import { memo } from 'react';
import type { Part, Point } from '../../model/job.ts';
import { findMaterial } from '../../model/materials/library.ts';
import type { Phrase } from '../../model/parts/part-kind.ts';
import { describePart } from '../../model/parts/registry.ts';
import { useJobStore } from '../../app/job-store.ts';
import { useViewStore } from '../../app/view-store.ts';
import { duplicate, remove } from './additions.ts';
import { setValue, tryCommand } from './editing.ts';
import { keepUnits } from './estimate-words.ts';
import { MaterialChoice, MaterialSwatch, useCentreHertz } from './MaterialChoice.tsx';
import { treatmentOf } from './materials.ts';
import type { Path } from './path-text.ts';
import { PointList } from './PointList.tsx';
import { Action, ThingLine } from './ThingLine.tsx';
import { NameValue, PointValue, QuantityValue } from './values.tsx';

interface PartProps {
  readonly part: Part;
  readonly index: number;
  readonly last: boolean;
}

/** The comma or full stop after a material is handed to its choice, which keeps it on its line. */
export function tiePunctuation(phrases: readonly Phrase[]): readonly { readonly phrase: Phrase; readonly after: string }[] {
  const isMaterial = (phrase: Phrase | undefined): boolean => phrase !== undefined && 'as' in phrase && phrase.as === 'material';
  const leading = (phrase: Phrase | undefined): string =>
    phrase !== undefined && 'text' in phrase ? (/^[,.;:]/.exec(phrase.text)?.[0] ?? '') : '';
  return phrases.map((phrase, k) => {
    if (isMaterial(phrase)) return { phrase, after: leading(phrases[k + 1]) };
    const cut = isMaterial(phrases[k - 1]) ? leading(phrase).length : 0;
    return { phrase: 'text' in phrase ? { text: phrase.text.slice(cut) } : phrase, after: '' };
  });
}

function readAt(part: Part, path: Path): unknown {
  return path.reduce<unknown>(
    (value, step) => (typeof value === 'object' && value !== null ? Reflect.get(value, step) : undefined),
    part,
  );
}

interface PhraseProps {
  readonly phrase: Phrase;
  readonly part: Part;
  readonly index: number;
  /** What the sentence goes on with. */
  readonly after: string;
}

function PhraseWords({ phrase, part, index, after }: PhraseProps) {
  if ('text' in phrase) return phrase.text;
  const path: Path = ['parts', index, ...phrase.path];
  const value = readAt(part, phrase.path);
  const label = `${part.name}, ${phrase.path.join(' ')}`;
  if (phrase.as === 'material') {
    const choose = (id: string): void => void setValue(path, id);
    return <MaterialChoice label={`Material of ${part.name}`} value={part.material} after={after} onChoose={choose} />;
  }
  if (phrase.as === 'point') return <PointValue path={path} point={value as Point} label={label} />;
  return <QuantityValue path={path} text={String(value)} label={label} dimension={phrase.as} />;
}

function Treatment({ part }: { readonly part: Part }) {
  const centre = useCentreHertz();
  const words = useJobStore((state) => treatmentOf(state.job, part.material, centre));
  const source = useJobStore((state) => findMaterial(state.job, part.material)?.source ?? '');
  const selected = useViewStore((state) => state.selection.includes(part.id));
  if (words === '') return null;
  return (
    <span className="soft">
      {keepUnits(` ${words.charAt(0).toUpperCase()}${words.slice(1)}.`)}
      {selected && source !== '' ? ` Source: ${source}.` : ''}
    </span>
  );
}

function ReferenceSwitch({ part, index }: { readonly part: Part; readonly index: number }) {
  const { leftOutOfReference } = part;
  const none = useJobStore((state) => state.job.reference !== 'without marked parts');
  if (none) return null;
  return (
    <button
      type="button"
      className="switch"
      aria-pressed={leftOutOfReference}
      title="Is the reference run made without this part?"
      onClick={() => void setValue(['parts', index, 'leftOutOfReference'], !leftOutOfReference)}
    >
      {leftOutOfReference ? 'Left out of the reference.' : 'Stays in the reference.'}
    </button>
  );
}

function PartActions({ part, index, last }: PartProps) {
  const { id, name } = part;
  const move = (to: number): void => void tryCommand({ do: 'reorder', id, to });
  return (
    <>
      <Action label={`Paint ${name} later, more on top`} words="raise" disabled={last} onAct={() => move(index + 1)} />
      <Action label={`Paint ${name} sooner, more below`} words="lower" disabled={index === 0} onAct={() => move(index - 1)} />
      <Action label={`Duplicate ${name}`} words="duplicate" onAct={() => duplicate([id])} />
      <Action label={`Remove ${name}`} words="remove" onAct={() => remove([id], name)} />
    </>
  );
}

export const PartLine = memo(function PartLine({ part, index, last }: PartProps) {
  const phrases = tiePunctuation(describePart(part));
  return (
    <ThingLine id={part.id} name={part.name} actions={<PartActions part={part} index={index} last={last} />}>
      <MaterialSwatch material={part.material} />
      <NameValue path={['parts', index, 'name']} text={part.name} label="Name of the part" />
      {phrases.map(({ phrase, after }, k) => (
        // A phrase is its place in the sentence; words like "to" come twice.
        // oxlint-disable-next-line react/no-array-index-key
        <PhraseWords key={k} phrase={phrase} part={part} index={index} after={after} />
      ))}
      <Treatment part={part} /> <ReferenceSwitch part={part} index={index} />
      <PointList part={part} index={index} />
    </ThingLine>
  );
});

/** One line: what it is and how big, from the values its sentence would hold. */
export function summarisePart(part: Part): string {
  const values = describePart(part).flatMap((phrase) => {
    if ('text' in phrase || phrase.as === 'material') return [];
    const value = readAt(part, phrase.path);
    return [Array.isArray(value) ? `(${value.join(', ')})` : String(value)];
  });
  return `${part.kind} ${values.join(' \u00b7 ')}`;
}

export const PartRow = memo(function PartRow({ part }: { readonly part: Part }) {
  const material = useJobStore((state) => findMaterial(state.job, part.material)?.name ?? part.material);
  const hovered = useViewStore((state) => state.hovered === part.id);
  const hover = useViewStore((state) => state.hover);
  const select = useViewStore((state) => state.select);
  return (
    <button
      type="button"
      className="part-row"
      data-hovered={hovered}
      onPointerEnter={() => hover(part.id)}
      onPointerLeave={() => hover(null)}
      onClick={() => select([part.id])}
    >
      <MaterialSwatch material={part.material} />
      <strong>{part.name}</strong>
      <span>{material}</span>
      <span className="soft">{summarisePart(part)}</span>
    </button>
  );
});
