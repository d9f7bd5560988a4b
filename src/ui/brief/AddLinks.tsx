// Owns the words under a heading that add a thing there.
// Must not know what is added.
import type { ReactNode } from 'react';

export function AddLinks({ children }: { readonly children: ReactNode }) {
  return <div className="add-links">{children}</div>;
}

interface AddLinkProps {
  readonly label: string;
  readonly pressed?: boolean;
  /** Takes the tool in hand, for those who point. */
  onDraw?(): void;
  /** Puts a thing of modest size in the middle, for those who type. */
  onAdd(): void;
}

export function AddLink({ label, pressed, onDraw, onAdd }: AddLinkProps) {
  return (
    <button
      type="button"
      className="add-link"
      aria-pressed={pressed}
      // A click made by the keyboard has no count.
      onClick={(event) => (onDraw === undefined || event.detail === 0 ? onAdd() : onDraw())}
    >
      + {label}
    </button>
  );
}
