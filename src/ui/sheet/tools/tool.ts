// Owns the words between the sheet and its tools: what comes in, what goes out.
// Must not know the DOM, stores beyond their types, or any tool in particular.
import type { HistoryPolicy } from '../../../app/job-store.ts';
import type { Tool } from '../../../app/view-store.ts';
import type { Command } from '../../../model/commands.ts';
import type { Job, Part, ResolvedJob, XY } from '../../../model/job.ts';
import type { Snap } from '../snap.ts';
import type { LengthUnit } from '../ticks.ts';
import type { Box } from '../viewport.ts';

export interface Modifiers {
  readonly shift: boolean;
  readonly alt: boolean;
  /** Ctrl, or Command on a Mac. */
  readonly ctrl: boolean;
}

/** `at` is the bare pointer in sheet metres; tools snap it themselves. */
export type ToolInput =
  | ({ readonly kind: 'press' | 'move' | 'release' | 'double'; readonly at: XY } & Modifiers)
  | ({ readonly kind: 'key'; readonly key: string } & Modifiers);

/** What a tool asks for; the sheet carries it out in order. */
export type ToolAction =
  | { readonly do: 'edit'; readonly command: Command; readonly policy: HistoryPolicy }
  /** Takes back everything joined under this key. */
  | { readonly do: 'bail'; readonly key: string }
  | { readonly do: 'select'; readonly ids: readonly string[] }
  /** Selects what the edit before made. */
  | { readonly do: 'select new' }
  | { readonly do: 'take'; readonly tool: Tool }
  | { readonly do: 'open dimension' };

export interface ToolContext {
  readonly job: Job;
  readonly resolved: ResolvedJob;
  readonly selection: readonly string[];
  readonly pixelsPerMetre: number;
  /** Unit of numbers typed bare. */
  readonly unit: LengthUnit;
  /** Material new parts get. */
  readonly paint: string;
  /** Unlike that of any gesture before. */
  readonly gesture: string;
}

/** Drawn over the sheet until it is real or gone. */
export type Preview =
  | { readonly kind: 'band'; readonly box: Box }
  | { readonly kind: 'part'; readonly part: Part | null; readonly points: readonly XY[] }
  | { readonly kind: 'place'; readonly at: XY };

/** The small box at the cursor where exact sizes are typed. */
export interface TypedBox {
  readonly at: XY;
  readonly fields: readonly {
    readonly name: string;
    /** As typed; empty while the value follows the pointer. */
    readonly text: string;
    readonly live: string;
  }[];
  readonly active: number;
  readonly problem: string | null;
}

export interface ToolStep<State> {
  readonly state: State;
  readonly commands: readonly ToolAction[];
  /** CSS cursor. */
  readonly cursor: string;
  readonly preview: Preview | null;
  readonly typed: TypedBox | null;
  readonly snap: Snap | null;
  /** False lets a key go on to the page (Tab leaves the sheet, Ctrl Z undoes). */
  readonly handled: boolean;
}

export const RECORD: HistoryPolicy = { kind: 'record' };

const ARROWS: Readonly<Record<string, XY>> = { ArrowLeft: [-1, 0], ArrowRight: [1, 0], ArrowDown: [0, -1], ArrowUp: [0, 1] };

/** Shift by the arrow keys: one step of the grid, ten with Shift; null for other keys. */
export function arrowShift(key: string, shift: boolean, step: number): XY | null {
  const arrow = ARROWS[key];
  const by = shift ? 10 * step : step;
  return arrow === undefined ? null : [arrow[0] * by, arrow[1] * by];
}
