// Owns the edits a person can make to a job: one pure function, one door.
// Must not know the DOM, React, stores, Node.
import type { Result } from '../base/result.ts';
import type { Drive, Job, OwnMaterial, Part, Probe, Quantity } from './job.ts';

export type ListName = 'parts' | 'drives' | 'probes' | 'materials';

/** Things on the sheet are named by their ids; ids are unique over parts, drives, probes and own materials. */
export type Command =
  /** Any single value: `set(['parts', 2, 'thickness'], '2 mm')`. The result must still be a valid job. */
  | { readonly do: 'set'; readonly path: readonly (string | number)[]; readonly value: unknown }
  | { readonly do: 'add'; readonly list: 'parts'; readonly item: Part; readonly at?: number }
  | { readonly do: 'add'; readonly list: 'drives'; readonly item: Drive; readonly at?: number }
  | { readonly do: 'add'; readonly list: 'probes'; readonly item: Probe; readonly at?: number }
  | { readonly do: 'add'; readonly list: 'materials'; readonly item: OwnMaterial; readonly at?: number }
  | { readonly do: 'remove'; readonly ids: readonly string[] }
  /** Replace a thing by an edited one with the same id (resizing, turning a kind into another). */
  | { readonly do: 'put'; readonly item: Part | Drive | Probe }
  /** Shift by metres; expressions are kept ("a/2" becomes "a/2 + 3 mm"), plain values are rewritten in their own unit. */
  | { readonly do: 'move'; readonly ids: readonly string[]; readonly dxMetres: number; readonly dyMetres: number }
  | { readonly do: 'duplicate'; readonly ids: readonly string[]; readonly dxMetres: number; readonly dyMetres: number }
  /** Painting order: index among the parts after the move; the last is on top. */
  | { readonly do: 'reorder'; readonly id: string; readonly to: number }
  | { readonly do: 'name value'; readonly name: string; readonly value: Quantity }
  | { readonly do: 'unname value'; readonly name: string }
  /** Switches the field out of the plane and converts line current amplitudes between A and V. */
  | { readonly do: 'set section'; readonly section: Job['section'] }
  /** Another document (opened, dropped, example). */
  | { readonly do: 'replace'; readonly job: Job };

/** Applies one command; never mutates `job`. Errors name path, value and mend. */
export declare function applyCommand(job: Job, command: Command): Result<Job>;
