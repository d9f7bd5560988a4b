// Owns the line of one thing in the Brief: it lights up with the thing on the sheet, both ways, and carries its actions.
// Must not know what the thing is.
import type { ReactNode } from 'react';
import { useEffect, useRef } from 'react';
import { useViewStore } from '../../app/view-store.ts';
import { SaidHere } from './SaidHere.tsx';

interface ThingLineProps {
  readonly id: string;
  readonly name: string;
  readonly children: ReactNode;
  /** Shown while the thing is selected or under the pointer. */
  readonly actions: ReactNode;
}

export function ThingLine({ id, name, children, actions }: ThingLineProps) {
  const selected = useViewStore((state) => state.selection.includes(id));
  const hovered = useViewStore((state) => state.hovered === id);
  const lineRef = useRef<HTMLFieldSetElement>(null);
  useEffect(() => (lineRef.current === null ? undefined : lightUp(lineRef.current, id)), [id]);
  useEffect(() => {
    // Chosen on the sheet: its sentence comes into view.
    if (selected && lineRef.current?.contains(document.activeElement) === false) {
      lineRef.current.scrollIntoView({ block: 'nearest' });
    }
  }, [selected]);
  return (
    <fieldset ref={lineRef} className="thing" aria-label={name} data-selected={selected} data-hovered={hovered}>
      <p>{children}</p>
      <div className="thing-actions">{actions}</div>
      <SaidHere place={id} />
    </fieldset>
  );
}

/** Pointing at the line or entering it is felt on the sheet. The line itself is no control: its values are. */
function lightUp(line: HTMLElement, id: string): () => void {
  const { hover, select } = useViewStore.getState();
  const choose = (): void => {
    if (!useViewStore.getState().selection.includes(id)) select([id]);
  };
  const listeners: Readonly<Record<string, () => void>> = {
    pointerenter: () => hover(id),
    pointerleave: () => hover(null),
    pointerdown: choose,
    focusin: choose,
  };
  for (const [type, listener] of Object.entries(listeners)) line.addEventListener(type, listener);
  return () => {
    for (const [type, listener] of Object.entries(listeners)) line.removeEventListener(type, listener);
  };
}

interface ActionProps {
  readonly label: string;
  readonly words: string;
  readonly disabled?: boolean;
  onAct(): void;
}

/** A small word that acts on the thing. */
export function Action({ label, words, disabled = false, onAct }: ActionProps) {
  return (
    <button type="button" className="action" aria-label={label} disabled={disabled} onClick={onAct}>
      {words}
    </button>
  );
}
