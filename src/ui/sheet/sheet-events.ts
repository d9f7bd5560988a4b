// Owns the DOM events of the sheet: pointer, wheel, fingers and keys turned into calls on the controller.
// Must not know stores, React, tools, or what is drawn.
import type { SheetController } from './sheet-controller.ts';
import type { Modifiers } from './tools/tool.ts';
import { readWheel } from './wheel.ts';

type Fingers = Map<number, { readonly x: number; readonly y: number }>;

const MIDDLE_BUTTON = 1;
const SECONDARY_BUTTON = 2;

/** Listens until the answer is called. Events on fields and buttons over the canvas are left alone. */
export function attachSheetEvents(host: HTMLElement, controller: SheetController): () => void {
  const ending = new AbortController();
  const { signal } = ending;
  listenToPointers(host, controller, signal);
  listenToKeys(host, controller, signal);
  host.addEventListener(
    'wheel',
    (event) => {
      event.preventDefault();
      const { deltaX, deltaY, deltaMode, ctrlKey, metaKey, shiftKey } = event;
      const meaning = readWheel({ deltaX, deltaY, deltaMode, ctrl: ctrlKey || metaKey, shift: shiftKey });
      const { x, y } = placeIn(host, event);
      if (meaning.kind === 'zoom') controller.zoom(meaning.factor, x, y);
      else controller.pan(meaning.dx, meaning.dy);
    },
    { signal, passive: false },
  );
  // The menu itself is the chrome's; here it is only told where. The menu key comes without the button.
  host.addEventListener(
    'contextmenu',
    (event) => {
      if (!onChrome(event)) controller.openMenu(event.button === SECONDARY_BUTTON ? placeIn(host, event) : null);
    },
    { signal },
  );
  return () => ending.abort();
}

function placeIn(host: HTMLElement, event: { clientX: number; clientY: number }): { x: number; y: number } {
  const box = host.getBoundingClientRect();
  return { x: event.clientX - box.left, y: event.clientY - box.top };
}

function modifiersOf(event: MouseEvent | KeyboardEvent): Modifiers {
  return { shift: event.shiftKey, alt: event.altKey, ctrl: event.ctrlKey || event.metaKey };
}

function onChrome(event: Event): boolean {
  return event.target instanceof Element && event.target.closest('[data-chrome]') !== null;
}

function listenToPointers(host: HTMLElement, controller: SheetController, signal: AbortSignal): void {
  const fingers: Fingers = new Map();
  let panning: { x: number; y: number } | null = null;

  host.addEventListener(
    'pointerdown',
    (event) => {
      delete host.dataset['keys'];
      if (onChrome(event)) return;
      const at = placeIn(host, event);
      host.focus({ preventScroll: true });
      if (event.button === SECONDARY_BUTTON) return;
      host.setPointerCapture(event.pointerId);
      if (event.pointerType === 'touch') fingers.set(event.pointerId, at);
      const pans = event.button === MIDDLE_BUTTON || host.dataset['space'] === 'down';
      if (pans) {
        event.preventDefault();
        panning = at;
        host.dataset['panning'] = 'yes';
      } else if (fingers.size > 1) controller.key('Escape', modifiersOf(event));
      else if (event.button === 0) controller.pointer('press', at.x, at.y, modifiersOf(event));
    },
    { signal },
  );
  host.addEventListener(
    'pointermove',
    (event) => {
      const at = placeIn(host, event);
      if (panning !== null) {
        controller.pan(at.x - panning.x, at.y - panning.y);
        panning = at;
      } else if (fingers.size > 1 && fingers.has(event.pointerId)) pinch(fingers, event.pointerId, at, controller);
      else if (!onChrome(event) || event.buttons !== 0) controller.pointer('move', at.x, at.y, modifiersOf(event));
    },
    { signal },
  );
  const lift = (event: PointerEvent): void => {
    const several = fingers.size > 1;
    fingers.delete(event.pointerId);
    const at = placeIn(host, event);
    if (panning !== null) {
      panning = null;
      delete host.dataset['panning'];
    } else if (!several && event.button === 0 && !onChrome(event)) controller.pointer('release', at.x, at.y, modifiersOf(event));
  };
  host.addEventListener('pointerup', lift, { signal });
  host.addEventListener(
    'pointercancel',
    (event) => {
      fingers.delete(event.pointerId);
      panning = null;
      delete host.dataset['panning'];
      controller.key('Escape', modifiersOf(event));
    },
    { signal },
  );
  host.addEventListener('pointerleave', () => controller.pointerLeft(), { signal });
  host.addEventListener(
    'dblclick',
    (event) => {
      if (onChrome(event)) return;
      const at = placeIn(host, event);
      controller.pointer('double', at.x, at.y, modifiersOf(event));
    },
    { signal },
  );
}

/** Two fingers zoom about their middle and pan with it. */
function pinch(fingers: Fingers, moved: number, to: { x: number; y: number }, controller: SheetController): void {
  const from = fingers.get(moved);
  const other = [...fingers].find(([id]) => id !== moved)?.[1];
  fingers.set(moved, to);
  if (from === undefined || other === undefined) return;
  const before = Math.hypot(from.x - other.x, from.y - other.y);
  const after = Math.hypot(to.x - other.x, to.y - other.y);
  controller.pan((to.x - from.x) / 2, (to.y - from.y) / 2);
  if (before > 0 && after > 0) controller.zoom(after / before, (to.x + other.x) / 2, (to.y + other.y) / 2);
}

function listenToKeys(host: HTMLElement, controller: SheetController, signal: AbortSignal): void {
  host.addEventListener(
    'keydown',
    (event) => {
      if (event.target !== host) return;
      host.dataset['keys'] = 'yes';
      controller.modifiersChanged(modifiersOf(event));
      const taken = controller.key(event.key, modifiersOf(event));
      // A space that is not part of a typed quantity holds the sheet for panning.
      if (!taken && event.key === ' ') host.dataset['space'] = 'down';
      if (!taken && event.key !== ' ') return;
      event.preventDefault();
      event.stopPropagation();
    },
    { signal },
  );
  host.addEventListener(
    'keyup',
    (event) => {
      if (event.key === ' ') delete host.dataset['space'];
      controller.modifiersChanged(modifiersOf(event));
    },
    { signal },
  );
  host.addEventListener('blur', () => delete host.dataset['space'], { signal });
}
