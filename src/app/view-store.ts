// Owns what the person looks at: selection, theme, tool, field shown, sheet view, readings shown. Never part of the job.
// Must not know React components or workers.
import { create } from 'zustand';
import type { FieldView } from '../../workers/protocol.ts';
import type { PartKind } from '../model/job.ts';

export type Tool =
  | { readonly kind: 'select' }
  | { readonly kind: 'draw'; readonly part: PartKind }
  | { readonly kind: 'place'; readonly thing: 'probe' | 'line current' };

export interface ViewState {
  readonly theme: 'light' | 'dark';
  readonly selection: readonly string[];
  /** Id under the pointer, in the Brief or on the sheet: both places light up. */
  readonly hovered: string | null;
  readonly tool: Tool;
  readonly field: FieldView;
  /** Field drawn over or under the drawing, or not at all. */
  readonly fieldPlace: 'under' | 'over' | 'off';
  /** Linear colour scale in V/m or A/m at full colour; null follows the peak. Magnitudes in dB use `decibelSpan`. */
  readonly fieldScale: number | null;
  readonly decibelSpan: number;
  /** Material new parts get. */
  readonly paint: string;
  /** Small jobs are solved again with every edit. */
  readonly follows: boolean;
  setTheme(theme: 'light' | 'dark'): void;
  select(ids: readonly string[]): void;
  hover(id: string | null): void;
  setTool(tool: Tool): void;
  setField(field: FieldView): void;
  setFieldPlace(place: 'under' | 'over' | 'off'): void;
  setFieldScale(scale: number | null): void;
  setDecibelSpan(span: number): void;
  setPaint(materialId: string): void;
  setFollows(follows: boolean): void;
}

const THEME_KEY = 'guidewall theme';

/** Nothing here needs a browser: without one (tests) the theme is light and is not remembered. */
function readTheme(): ViewState['theme'] {
  const kept = globalThis.localStorage?.getItem(THEME_KEY);
  if (kept === 'light' || kept === 'dark') return kept;
  return globalThis.matchMedia?.('(prefers-color-scheme: dark)').matches ? 'dark' : 'light';
}

function sameIds(a: readonly string[], b: readonly string[]): boolean {
  return a.length === b.length && a.every((id, k) => id === b[k]);
}

export const useViewStore = create<ViewState>()((set) => ({
  theme: readTheme(),
  selection: [],
  hovered: null,
  tool: { kind: 'select' },
  field: 'Ez',
  fieldPlace: 'under',
  fieldScale: null,
  decibelSpan: 60,
  paint: 'perfect-metal',
  follows: true,
  setTheme: (theme) => {
    globalThis.localStorage?.setItem(THEME_KEY, theme);
    set({ theme });
  },
  // Same ids, same array: whoever draws the selection is not woken for nothing.
  select: (ids) => set((state) => (sameIds(state.selection, ids) ? state : { selection: ids })),
  hover: (id) => set((state) => (state.hovered === id ? state : { hovered: id })),
  setTool: (tool) => set({ tool }),
  setField: (field) => set({ field }),
  setFieldPlace: (fieldPlace) => set({ fieldPlace }),
  setFieldScale: (fieldScale) => set({ fieldScale }),
  setDecibelSpan: (decibelSpan) => set({ decibelSpan }),
  setPaint: (paint) => set({ paint }),
  setFollows: (follows) => set({ follows }),
}));
