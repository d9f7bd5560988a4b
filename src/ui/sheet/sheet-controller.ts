// Owns the live sheet outside React: viewport, tool in hand, what is painted when, and what the chrome over it shows.
// Must not know React, DOM events, or workers.
import { setFrameLimits, subscribeFrame } from '../../app/frame-channel.ts';
import { useJobStore } from '../../app/job-store.ts';
import { useRunStore } from '../../app/run-store.ts';
import { useViewStore, type Tool } from '../../app/view-store.ts';
import type { AppError } from '../../base/result.ts';
import type { ResolvedJob, XY } from '../../model/job.ts';
import { sheetBox } from './layers/edges-layer.ts';
import { placeDimensions, type PlacedDimension } from './layers/selection-layer.ts';
import type { Palette } from './palette.ts';
import { EMPTY_OVERLAY, makeOverlay, type SheetOverlay } from './sheet-overlay.ts';
import type { Marks } from './sheet-painter.ts';
import { makePicture } from './sheet-picture.ts';
import { ShownField } from './shown-field.ts';
import { makeStage, type Canvases, type Stage } from './stage.ts';
import { findPart, thingAt, thingIds } from './things.ts';
import { makeRuler } from './ticks.ts';
import { reduceTool, takeTool, type ToolState } from './tools/reduce-tool.ts';
import type { Modifiers, ToolAction, ToolContext, ToolInput, ToolStep } from './tools/tool.ts';
import { fitView, panView, resizeView, RULER_LEFT, RULER_TOP, toSheet, zoomAt, type Size, type Viewport } from './viewport.ts';

/** Frames larger than this cost more to paint than the eye gains: 4 ms of 8 on a plain laptop without a GPU. */
const LARGEST_FRAME: Size = { width: 960, height: 640 };

/** Pixels of the foot that the coordinates take. */
const READOUT_PIXELS = 236;

const ZOOM_KEY_FACTOR = 1.25;

const NO_MODIFIERS: Modifiers = { shift: false, alt: false, ctrl: false };

type Layer = 'frame' | 'field' | 'drawing' | 'marks';

export class SheetController {
  readonly #stage: Stage;
  readonly #field = new ShownField();
  readonly #listeners = new Set<() => void>();
  readonly #endings: (() => void)[] = [];
  readonly #dirty = new Set<Layer>(['frame', 'field', 'drawing', 'marks']);
  readonly #onCursor: (cursor: string) => void;
  #palette: Palette;
  #resolved: ResolvedJob | null = null;
  #size: Size = { width: 0, height: 0 };
  #view: Viewport | null = null;
  /** True until the person pans or zooms: a fitted sheet stays fitted when its place is resized. */
  #fitted = true;
  #tool: ToolState;
  #step: ToolStep<ToolState> | null = null;
  #cursor: XY | null = null;
  #lastModifiers = NO_MODIFIERS;
  #menuPoint: XY | null = null;
  #gesture = 0;
  #editing: number | null = null;
  #overlay: SheetOverlay = EMPTY_OVERLAY;
  /** Ids before the last edit, to tell what it made. */
  #idsBefore: ReadonlySet<string> = new Set();
  /** Why the last edit made here was refused. */
  #refusal: AppError | null = null;
  #request = 0;

  constructor(canvases: Canvases, palette: Palette, onCursor: (cursor: string) => void) {
    this.#stage = makeStage(canvases);
    this.#palette = palette;
    this.#onCursor = onCursor;
    this.#tool = takeTool(useViewStore.getState().tool, [0, 0]);
    this.#takeJob();
    this.#endings.push(
      useJobStore.subscribe((state, before) => {
        if (state.job !== before.job || state.resolved !== before.resolved) this.#takeJob();
      }),
      useViewStore.subscribe((state, before) => this.#viewChanged(state, before)),
      useRunStore.subscribe(({ progress }, before) => {
        if (progress.state !== before.progress.state) this.#spoil('frame', 'field', 'marks');
      }),
      subscribeFrame(() => this.#spoil('frame', 'field', 'marks')),
    );
  }

  destroy(): void {
    for (const end of this.#endings) end();
    cancelAnimationFrame(this.#request);
    this.#listeners.clear();
  }

  readonly overlay = (): SheetOverlay => this.#overlay;

  readonly subscribe = (listener: () => void): (() => void) => {
    this.#listeners.add(listener);
    return () => void this.#listeners.delete(listener);
  };

  setPalette(palette: Palette): void {
    this.#palette = palette;
    this.#spoil('frame', 'field', 'drawing', 'marks');
  }

  resize(size: Size, devicePixelRatio: number): void {
    if (!this.#stage.resize(size, devicePixelRatio)) return;
    const before = this.#size;
    this.#size = size;
    setFrameLimits(
      Math.min(LARGEST_FRAME.width, size.width * devicePixelRatio),
      Math.min(LARGEST_FRAME.height, size.height * devicePixelRatio),
    );
    if (this.#view === null || this.#fitted) this.fit();
    else this.#look(resizeView(this.#view, before, size));
    // Setting a canvas's size clears it; painting in the same task keeps it from flashing.
    this.#paint();
  }

  fit(): void {
    if (this.#resolved === null || this.#size.width === 0) return;
    this.#look(fitView(sheetBox(this.#resolved.sheet), this.#size));
    this.#fitted = true;
  }

  pan(dx: number, dy: number): void {
    if (this.#view === null) return;
    this.#look(panView(this.#view, dx, dy));
    this.#fitted = false;
  }

  /** About (x, y), or about the middle of the canvas. */
  zoom(factor: number, x = (RULER_LEFT + this.#size.width) / 2, y = (RULER_TOP + this.#size.height) / 2): void {
    if (this.#view === null || this.#resolved === null) return;
    const fitted = fitView(sheetBox(this.#resolved.sheet), this.#size).pixelsPerMetre;
    this.#look(zoomAt(this.#view, factor, x, y, fitted));
    this.#fitted = false;
  }

  pointer(kind: 'press' | 'move' | 'release' | 'double', x: number, y: number, modifiers: Modifiers): void {
    if (this.#view === null) return;
    const at = toSheet(this.#view, x, y);
    this.#cursor = at;
    this.#lastModifiers = modifiers;
    if (kind === 'press') {
      this.#gesture++;
      this.#refusal = null;
      this.editDimension(null);
    }
    this.#feed({ kind, at, ...modifiers });
    this.#hover(at);
    this.#spoil('marks');
  }

  pointerLeft(): void {
    this.#cursor = null;
    useViewStore.getState().hover(null);
    this.#spoil('marks');
  }

  /** Shift and Alt act at once, not only with the next movement. */
  modifiersChanged(modifiers: Modifiers): void {
    if (this.#cursor === null || this.#tool.kind === 'select') return;
    const { shift, alt } = this.#lastModifiers;
    if (shift === modifiers.shift && alt === modifiers.alt) return;
    this.#lastModifiers = modifiers;
    this.#feed({ kind: 'move', at: this.#cursor, ...modifiers });
  }

  /** True when the key was taken: by the tool in hand, else by the view. */
  key(key: string, modifiers: Modifiers): boolean {
    const step = this.#feed({ kind: 'key', key, ...modifiers });
    if (step === null || step.handled) return step !== null;
    if (modifiers.ctrl || modifiers.alt) return false;
    if (key === '+' || key === '=') this.zoom(ZOOM_KEY_FACTOR);
    else if (key === '-' || key === '−') this.zoom(1 / ZOOM_KEY_FACTOR);
    else if (key.toLowerCase() === 'f') this.fit();
    else return false;
    return true;
  }

  /** The menu speaks of what lies under the pointer; opened by key (null), of what is selected. */
  openMenu(at: { readonly x: number; readonly y: number } | null): void {
    if (this.#view === null || this.#resolved === null) return;
    this.#menuPoint = at === null ? (this.#cursor ?? this.#middle()) : toSheet(this.#view, at.x, at.y);
    if (at === null) return;
    const id = thingAt(this.#resolved, this.#menuPoint, this.#view.pixelsPerMetre);
    const { selection, select } = useViewStore.getState();
    if (id === null) select([]);
    else if (!selection.includes(id)) select([id]);
  }

  /** What the menu asks of the place where it stands; null before the sheet has been drawn. */
  atMenu(ask: (at: XY, context: ToolContext) => ToolAction | null): ToolAction | null {
    const context = this.#context();
    return context === null ? null : ask(this.#menuPoint ?? this.#middle(), context);
  }

  /** Takes a tool and sets its first point where the menu stood. */
  startAtMenu(tool: Tool): void {
    const at = this.#menuPoint ?? this.#middle();
    useViewStore.getState().setTool(tool);
    if (tool.kind === 'draw' && tool.part === 'stroke') return;
    this.#gesture++;
    for (const kind of ['press', 'release'] as const) this.#feed({ kind, at, ...NO_MODIFIERS });
  }

  /** Carries out what a menu asks of the selection. */
  act(commands: (context: ToolContext) => readonly ToolAction[]): void {
    const context = this.#context();
    if (context !== null) for (const action of commands(context)) this.#carryOut(action);
  }

  editDimension(index: number | null): void {
    if (this.#editing === index) return;
    this.#editing = index;
    this.#spoil('marks');
  }

  picture(): Promise<Blob> {
    const marks = this.#marks([]);
    if (this.#view === null || marks === null) return Promise.reject(new Error('the sheet has not been drawn yet'));
    return makePicture({
      job: useJobStore.getState().job,
      view: this.#view,
      size: this.#size,
      palette: this.#palette,
      marks,
      shown: this.#field.read(),
      fieldPlace: useViewStore.getState().fieldPlace,
      madeAt: new Date(),
    });
  }

  #takeJob(): void {
    const { resolved } = useJobStore.getState();
    if (resolved.ok) {
      const before = this.#resolved?.sheet;
      const { sheet } = resolved.value;
      this.#resolved = resolved.value;
      const [x, y] = sheet.originMetres;
      const same = before?.widthMetres === sheet.widthMetres && before.heightMetres === sheet.heightMetres;
      if (!same || before.originMetres[0] !== x || before.originMetres[1] !== y) this.fit();
    }
    this.#spoil('field', 'drawing', 'marks');
  }

  #viewChanged(state: ReturnType<typeof useViewStore.getState>, before: typeof state): void {
    if (state.tool !== before.tool) this.#takeTool(state.tool);
    if (state.selection !== before.selection) this.#editing = null;
    const scale = state.fieldScale !== before.fieldScale || state.decibelSpan !== before.decibelSpan;
    if (scale || state.field !== before.field || state.fieldPlace !== before.fieldPlace) this.#spoil('frame', 'field');
    this.#spoil('marks');
  }

  #takeTool(tool: Tool): void {
    this.#tool = takeTool(tool, this.#cursor ?? this.#middle());
    this.#step = null;
    const context = this.#context();
    // A tool just taken shows its box and cursor before the pointer moves.
    if (context !== null && tool.kind !== 'select') this.#feed({ kind: 'key', key: '', ...NO_MODIFIERS });
    else this.#onCursor('default');
    this.#spoil('marks');
  }

  #middle(): XY {
    if (this.#view === null) return [0, 0];
    return toSheet(this.#view, (RULER_LEFT + this.#size.width) / 2, (RULER_TOP + this.#size.height) / 2);
  }

  #context(): ToolContext | null {
    if (this.#view === null || this.#resolved === null) return null;
    const { selection, paint } = useViewStore.getState();
    return {
      job: useJobStore.getState().job,
      resolved: this.#resolved,
      selection,
      pixelsPerMetre: this.#view.pixelsPerMetre,
      unit: makeRuler(this.#view.pixelsPerMetre).unit,
      paint,
      gesture: `gesture ${this.#gesture}`,
    };
  }

  #feed(input: ToolInput): ToolStep<ToolState> | null {
    const context = this.#context();
    if (context === null) return null;
    const step = reduceTool(this.#tool, input, context);
    this.#tool = step.state;
    this.#step = step;
    this.#onCursor(step.cursor);
    for (const action of step.commands) this.#carryOut(action);
    this.#spoil('marks');
    return step;
  }

  #carryOut(action: ToolAction): void {
    const view = useViewStore.getState();
    switch (action.do) {
      case 'edit': {
        this.#idsBefore = new Set(thingIds(useJobStore.getState().job));
        const done = useJobStore.getState().dispatch(action.command, action.policy);
        this.#refusal = done.ok ? null : done.errors[0];
        return;
      }
      case 'bail':
        return useJobStore.getState().bail(action.key);
      case 'select':
        return view.select(action.ids);
      case 'select new': {
        const before = this.#idsBefore;
        return view.select(thingIds(useJobStore.getState().job).filter((id) => !before.has(id)));
      }
      case 'take':
        return view.setTool(action.tool);
      case 'open dimension':
        return this.editDimension(0);
    }
  }

  #hover(at: XY): void {
    if (this.#view === null || this.#resolved === null) return;
    const idle = this.#tool.kind === 'select';
    useViewStore.getState().hover(idle ? thingAt(this.#resolved, at, this.#view.pixelsPerMetre) : null);
  }

  #look(view: Viewport): void {
    this.#view = view;
    this.#spoil('field', 'drawing', 'marks');
  }

  #spoil(...layers: readonly Layer[]): void {
    for (const layer of layers) this.#dirty.add(layer);
    if (this.#request === 0) this.#request = requestAnimationFrame(() => this.#paint());
  }

  #paint(): void {
    cancelAnimationFrame(this.#request);
    this.#request = 0;
    const { stage, view, resolved, palette } = {
      stage: this.#stage,
      view: this.#view,
      resolved: this.#resolved,
      palette: this.#palette,
    };
    if (view === null || resolved === null) return;
    if (this.#dirty.has('frame')) stage.takeFrame(this.#field.read(), palette);
    if (this.#dirty.has('field')) stage.paintField(view, palette, resolved);
    if (this.#dirty.has('drawing')) stage.paintDrawing(view, palette, resolved);
    if (this.#dirty.has('marks')) {
      const dimensions = this.#dimensions(view);
      const marks = this.#marks(dimensions);
      if (marks !== null) stage.paintMarks(view, palette, marks);
      this.#tellOverlay(view, resolved, dimensions);
    }
    this.#dirty.clear();
  }

  /** Dimensions stand only while the part is at rest or resized: during a drawing they would be in the way. */
  #dimensions(view: Viewport): readonly PlacedDimension[] {
    const { selection } = useViewStore.getState();
    const { job } = useJobStore.getState();
    const part = selection.length === 1 && this.#tool.kind === 'select' ? findPart(job, selection[0]) : null;
    return part === null ? [] : placeDimensions(part, job, view, this.#size);
  }

  #marks(dimensions: readonly PlacedDimension[]): Marks | null {
    if (this.#resolved === null) return null;
    const { selection, hovered } = useViewStore.getState();
    return {
      job: useJobStore.getState().job,
      resolved: this.#resolved,
      selection,
      hovered,
      dimensions,
      handles: this.#tool.kind === 'select',
      preview: this.#step?.preview ?? null,
      snap: this.#step?.snap ?? null,
      cursor: this.#cursor,
      field: this.#field.readScale(),
      footFrom: READOUT_PIXELS,
    };
  }

  #tellOverlay(view: Viewport, resolved: ResolvedJob, dimensions: readonly PlacedDimension[]): void {
    const store = useJobStore.getState();
    const broken = store.resolved.ok ? null : store.resolved.errors[0];
    this.#overlay = makeOverlay({
      job: store.job,
      resolved,
      selection: useViewStore.getState().selection,
      view,
      size: this.#size,
      dimensions,
      editing: this.#editing,
      tool: this.#tool,
      typed: this.#step?.typed ?? null,
      snap: this.#step?.snap ?? null,
      cursor: this.#cursor,
      refusal: this.#refusal,
      broken,
    });
    for (const listener of this.#listeners) listener();
  }
}
