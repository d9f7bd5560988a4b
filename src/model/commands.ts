// Owns the edits a person can make to a job: one pure function, one door.
// Must not know the DOM, React, stores, Node.
import type { Result } from '../base/result.ts';
import { ok } from '../base/result.ts';
import {
  duplicateThings,
  findUnknownId,
  insertAt,
  moveThings,
  putThing,
  removeThings,
  reorderPart,
  setAt,
  setSection,
} from './edit-job.ts';
import { renameValue } from './rename-value.ts';
import type { Drive, Job, OwnMaterial, Part, Probe, Quantity } from './job.ts';
import { validateJob } from './parse-job.ts';
import { copyPlainData } from './plain-data.ts';

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
  /** Another name for a named value, here and wherever it is used. */
  | { readonly do: 'rename value'; readonly name: string; readonly to: string }
  /** Switches the field out of the plane and converts line current amplitudes between A and V. */
  | { readonly do: 'set section'; readonly section: Job['section'] }
  /** Another document (opened, dropped, example). */
  | { readonly do: 'replace'; readonly job: Job };

/** The job after the command, before it is judged; plain data that may not be a job. */
function edit(job: Job, command: Command): Result<unknown> {
  switch (command.do) {
    case 'set':
      return command.path.length === 1 && command.path[0] === 'section'
        ? ok(setSection(job, command.value as Job['section']))
        : setAt(job, command.path, command.value);
    case 'add':
      return ok({ ...job, [command.list]: insertAt<unknown>(job[command.list], command.item, command.at) });
    case 'remove':
    case 'move':
    case 'duplicate': {
      const known = findUnknownId(job, command.ids);
      if (!known.ok) return known;
      if (command.do === 'remove') return removeThings(job, command.ids);
      const { ids, dxMetres, dyMetres } = command;
      return ok(command.do === 'move' ? moveThings(job, ids, dxMetres, dyMetres) : duplicateThings(job, ids, dxMetres, dyMetres));
    }
    case 'put':
      return putThing(job, command.item);
    case 'reorder':
      return reorderPart(job, command.id, command.to);
    case 'name value':
      return setAt(job, ['values', command.name], command.value);
    case 'unname value':
      return setAt(job, ['values', command.name], undefined);
    case 'rename value':
      return renameValue(job, command.name, command.to);
    case 'set section':
      return ok(setSection(job, command.section));
    case 'replace':
      return ok(command.job);
  }
}

/** Applies one command; never mutates `job`. What the command leaves alone keeps its identity. Errors name path, value and mend. */
export function applyCommand(job: Job, command: Command): Result<Job> {
  // The command may carry anything (`set` does); the job itself is known to be plain.
  const plain = copyPlainData(command);
  if (!plain.ok) return plain;
  const edited = edit(job, plain.value as Command);
  return edited.ok ? validateJob(edited.value, job) : edited;
}

/** Ids that `after` has and `before` has not: what to select after adding or duplicating. */
export function findAddedIds(before: Job, after: Job): readonly string[] {
  const former = new Set([...before.parts, ...before.drives, ...before.probes, ...before.materials].map((thing) => thing.id));
  return [...after.parts, ...after.drives, ...after.probes, ...after.materials]
    .map((thing) => thing.id)
    .filter((id) => !former.has(id));
}
