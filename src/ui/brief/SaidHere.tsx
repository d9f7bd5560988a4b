// Owns showing what is said of a thing or under a heading, right where it belongs.
// Must not know what can be said.
import { createContext, use } from 'react';
import type { Said, SaidByPlace } from './remarks.ts';

export const SaidContext = createContext<SaidByPlace>(new Map());

const NOTHING: readonly Said[] = [];

export function SaidHere({ place }: { readonly place: string }) {
  const said = use(SaidContext).get(place) ?? NOTHING;
  if (said.length === 0) return null;
  return (
    <ul className="said" aria-live="polite">
      {said.map((item) => (
        <li key={item.text} data-weight={item.weight}>
          <span className="said-mark" aria-hidden="true">
            {item.weight === 'error' ? '!' : 'i'}
          </span>
          <span>
            <span className="hidden-visually">{item.weight === 'error' ? 'Error: ' : 'Remark: '}</span>
            {item.text}
            {item.hint === null ? null : <span className="soft"> {item.hint}</span>}
          </span>
        </li>
      ))}
    </ul>
  );
}
