// Owns the small box at the cursor that shows what is typed while drawing.
// Must not know tools, keys, or the job.
import type { ReactElement } from 'react';
import type { SheetOverlay } from './sheet-overlay.ts';

export function TypedValues({ typed }: { typed: NonNullable<SheetOverlay['typed']> }): ReactElement {
  return (
    <div className="sheet-typed" style={{ left: typed.x, top: typed.y }}>
      {typed.fields.map((field, index) => (
        <div key={field.name} data-active={index === typed.active}>
          <span className="soft">{field.name}</span>
          {field.text === '' ? (
            <span className="num soft">{field.live}</span>
          ) : (
            <span className="num sheet-typing">{field.text}</span>
          )}
        </div>
      ))}
      {typed.problem === null ? null : (
        <div className="sheet-problem" role="alert">
          {typed.problem}
        </div>
      )}
    </div>
  );
}
