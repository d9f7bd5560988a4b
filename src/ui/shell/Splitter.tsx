// Owns the line between two places that can be moved by pointer or arrow keys, and remembering where it stands.
// Must not know the places, which take their size from a custom property of the page.
import { useEffect, useRef } from 'react';

export interface SplitterSpec {
  /** Custom property that holds the size in pixels, e.g. `--brief-width`. */
  readonly property: string;
  readonly label: string;
  readonly direction: 'left and right' | 'up and down';
  /** Does the place grow when the line moves right or down? */
  readonly grows: 'with' | 'against';
  readonly initial: number;
  readonly least: number;
  readonly most: number;
}

const KEY_PIXELS = 16;

export function Splitter({ spec }: { readonly spec: SplitterSpec }) {
  const lineRef = useRef<HTMLHRElement>(null);
  useEffect(() => (lineRef.current === null ? undefined : bringToLife(lineRef.current, spec)), [spec]);
  return (
    <hr
      ref={lineRef}
      className="splitter"
      data-direction={spec.direction}
      aria-label={spec.label}
      aria-orientation={spec.direction === 'left and right' ? 'vertical' : 'horizontal'}
      aria-valuemin={spec.least}
      aria-valuemax={spec.most}
    />
  );
}

export function clampSize(size: number, { least, most }: Pick<SplitterSpec, 'least' | 'most'>): number {
  return Math.round(Math.min(most, Math.max(least, size)));
}

/** Size after the line has moved by `pixels` to the right or down. */
export function moveSize(size: number, pixels: number, spec: SplitterSpec): number {
  return clampSize(spec.grows === 'with' ? size + pixels : size - pixels, spec);
}

/** Pixels an arrow key moves the line by; 0 for other keys. */
export function keyPixels(key: string, direction: SplitterSpec['direction']): number {
  const [back, on] = direction === 'left and right' ? ['ArrowLeft', 'ArrowRight'] : ['ArrowUp', 'ArrowDown'];
  return key === on ? KEY_PIXELS : key === back ? -KEY_PIXELS : 0;
}

/** Sizes go straight to the style sheet: React draws nothing anew while the line is dragged. */
function bringToLife(line: HTMLElement, spec: SplitterSpec): () => void {
  const { property, direction, initial } = spec;
  const key = `guidewall ${property}`;
  let size = clampSize(Number(localStorage.getItem(key) ?? initial) || initial, spec);
  const put = (next: number): void => {
    size = next;
    document.documentElement.style.setProperty(property, `${size}px`);
    line.setAttribute('aria-valuenow', String(size));
  };
  const keep = (): void => localStorage.setItem(key, String(size));
  const along = (event: PointerEvent): number => (direction === 'left and right' ? event.clientX : event.clientY);
  let held: { readonly at: number; readonly size: number } | null = null;

  const listeners: {
    [K in 'pointerdown' | 'pointermove' | 'pointerup' | 'pointercancel' | 'keydown' | 'dblclick']: (
      event: HTMLElementEventMap[K],
    ) => void;
  } = {
    pointerdown: (event) => {
      event.preventDefault();
      line.setPointerCapture(event.pointerId);
      held = { at: along(event), size };
      line.dataset['held'] = 'true';
    },
    pointermove: (event) => {
      if (held !== null) put(moveSize(held.size, along(event) - held.at, spec));
    },
    pointerup: () => release(),
    pointercancel: () => release(),
    keydown: (event) => {
      const pixels = keyPixels(event.key, direction);
      if (pixels === 0) return;
      event.preventDefault();
      put(moveSize(size, pixels, spec));
      keep();
    },
    dblclick: () => {
      put(initial);
      keep();
    },
  };
  function release(): void {
    held = null;
    delete line.dataset['held'];
    keep();
  }

  put(size);
  line.tabIndex = 0;
  for (const [type, listener] of Object.entries(listeners)) line.addEventListener(type, listener as EventListener);
  return () => {
    for (const [type, listener] of Object.entries(listeners)) line.removeEventListener(type, listener as EventListener);
  };
}
