// Owns the sheet as a component: its canvases, the controller behind them, and the chrome over them.
// Must not know how things are drawn, tools, or workers.
import { useEffect, useRef, useState, useSyncExternalStore, type ReactElement } from 'react';
import { registerSheetExporter } from '../../app/sheet-exporter.ts';
import { useViewStore } from '../../app/view-store.ts';
import { DimensionChips } from './DimensionChips.tsx';
import { makePalette, type Palette } from './palette.ts';
import { SheetController } from './sheet-controller.ts';
import { attachSheetEvents } from './sheet-events.ts';
import { EMPTY_OVERLAY } from './sheet-overlay.ts';
import { SheetMenu } from './SheetMenu.tsx';
import { TypedValues } from './TypedValues.tsx';
import './sheet.css';

export function Sheet(): ReactElement {
  const host = useRef<HTMLDivElement>(null);
  const fieldCanvas = useRef<HTMLCanvasElement>(null);
  const drawingCanvas = useRef<HTMLCanvasElement>(null);
  const marksCanvas = useRef<HTMLCanvasElement>(null);
  const [controller, setController] = useState<SheetController | null>(null);
  const fieldPlace = useViewStore((state) => state.fieldPlace);

  useEffect(() => {
    const [element, field, drawing, marks] = [host.current, fieldCanvas.current, drawingCanvas.current, marksCanvas.current];
    if (element === null || field === null || drawing === null || marks === null) return;
    const made = new SheetController(
      { field, drawing, marks },
      readPalette(element),
      (cursor) => (element.style.cursor = cursor),
    );
    const endings = [
      () => made.destroy(),
      attachSheetEvents(element, made),
      followSize(element, (width, height) => made.resize({ width, height }, window.devicePixelRatio)),
      followTheme(() => made.setPalette(readPalette(element))),
      registerSheetExporter(() => made.picture()),
      followTool(() => element.focus()),
    ];
    setController(made);
    return () => {
      for (const end of endings) end();
      setController(null);
    };
  }, []);

  const focusSheet = (): void => host.current?.focus();
  return (
    <SheetMenu controller={controller} focusSheet={focusSheet}>
      <div
        ref={host}
        className="sheet"
        role="application"
        aria-label="Sheet: the cross-section, drawn to scale. Tab goes through the things on it, arrows move the selected one, the menu key adds."
        // oxlint-disable-next-line jsx-a11y/no-noninteractive-tabindex -- an application takes keys, so it must take focus
        tabIndex={0}
        data-field={fieldPlace}
      >
        <canvas ref={fieldCanvas} className="sheet-field" />
        <canvas ref={drawingCanvas} className="sheet-drawing" />
        <canvas ref={marksCanvas} className="sheet-marks" />
        {controller === null ? null : <Chrome controller={controller} focusSheet={focusSheet} />}
      </div>
    </SheetMenu>
  );
}

function Chrome({ controller, focusSheet }: { controller: SheetController; focusSheet: () => void }): ReactElement {
  const overlay = useSyncExternalStore(controller.subscribe, controller.overlay, () => EMPTY_OVERLAY);
  const edit = (index: number | null): void => {
    controller.editDimension(index);
    if (index === null) focusSheet();
  };
  return (
    <>
      <DimensionChips chips={overlay.chips} editing={overlay.editing} edit={edit} />
      {overlay.typed === null ? null : <TypedValues typed={overlay.typed} />}
      {overlay.hint === null ? null : (
        <div className="sheet-hint" data-trouble={overlay.troubled}>
          {overlay.hint}
        </div>
      )}
      <div className="sheet-readout num" data-chrome>
        {overlay.readout === null ? (
          <span className="soft">x · y</span>
        ) : (
          <>
            <span className="soft">x</span> {minus(overlay.readout.x)} <span className="soft">y</span> {minus(overlay.readout.y)}
          </>
        )}
      </div>
      <output className="hidden-visually">{overlay.said}</output>
    </>
  );
}

function minus(text: string): string {
  return text.replace('-', '−');
}

function readPalette(element: Element): Palette {
  const style = getComputedStyle(element);
  const theme = document.documentElement.dataset['theme'] === 'dark' ? 'dark' : 'light';
  return makePalette((name) => style.getPropertyValue(name).trim(), theme);
}

/** A tool taken up anywhere, by a word of the Brief or a command, wants the keys: the next digits are a size. */
function followTool(takenUp: () => void): () => void {
  return useViewStore.subscribe(({ tool }, before) => {
    if (tool !== before.tool && tool.kind !== 'select') requestAnimationFrame(takenUp);
  });
}

/** Calls back with the size in CSS pixels now and on every change, of the zoom of the page too. */
function followSize(element: HTMLElement, changed: (width: number, height: number) => void): () => void {
  const tell = (): void => {
    const { width, height } = element.getBoundingClientRect();
    changed(Math.round(width), Math.round(height));
  };
  const observer = new ResizeObserver(tell);
  observer.observe(element);
  window.addEventListener('resize', tell);
  tell();
  return () => {
    observer.disconnect();
    window.removeEventListener('resize', tell);
  };
}

/** The theme is an attribute of the page, put by whoever owns it. Web fonts that arrive late change the drawing too. */
function followTheme(changed: () => void): () => void {
  const observer = new MutationObserver(changed);
  observer.observe(document.documentElement, { attributes: true, attributeFilter: ['data-theme'] });
  document.fonts.addEventListener('loadingdone', changed);
  return () => {
    observer.disconnect();
    document.fonts.removeEventListener('loadingdone', changed);
  };
}
