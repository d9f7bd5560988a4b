// Owns one plot's place on the page and what is said of it to those who cannot see it.
// Must not know uPlot.
import { useEffect, useRef } from 'react';
import { nearestIndex } from './nearest-index.ts';
import type { PlotContent } from './plot-content.ts';
import { PlotController } from './plot-controller.ts';

export interface PlotProps extends PlotContent {
  readonly label: string;
  /** What a cursor placed there reads, in words. */
  readonly wordsAt: (x: number) => string;
}

export function Plot(props: PlotProps) {
  const host = useRef<HTMLDivElement>(null);
  const controller = useRef<PlotController | null>(null);
  useEffect(() => {
    if (host.current === null) return undefined;
    const made = new PlotController(host.current);
    controller.current = made;
    return () => {
      made.destroy();
      controller.current = null;
    };
  }, []);
  useEffect(() => controller.current?.update(props));
  return (
    <div className="plot-place">
      <div className="plot" ref={host} />
      <CursorHandle which={0} {...props} />
      <CursorHandle which={1} {...props} />
    </div>
  );
}

/** The keys' way to a cursor: an unseen slider over the points of the axis. */
function CursorHandle({ which, x, cursors, onCursor, label, wordsAt }: PlotProps & { readonly which: 0 | 1 }) {
  const cursor = cursors[which];
  return (
    <input
      className="hidden-visually"
      type="range"
      aria-label={`${label}, ${which === 0 ? 'first' : 'second'} cursor`}
      aria-valuetext={cursor === null ? 'not placed' : wordsAt(cursor)}
      min={0}
      max={Math.max(0, x.length - 1)}
      step={1}
      value={cursor === null ? 0 : nearestIndex(x, cursor)}
      onChange={(event) => {
        const value = x[Number(event.target.value)];
        if (value !== undefined) onCursor(which, value);
      }}
    />
  );
}
