// Owns the list of kinds of part, and asking a part of any kind.
// Must not know what any kind does.
import type { NamedValues } from '../../base/quantity.ts';
import type { Result } from '../../base/result.ts';
import type { Part, PartKind, XY } from '../job.ts';
import { discKind } from './disc.ts';
import type { Handle, PartDimension, PartKindRules, Phrase } from './part-kind.ts';
import { polygonKind } from './polygon.ts';
import { rectangleKind } from './rectangle.ts';
import { ringKind } from './ring.ts';
import { strokeKind } from './stroke.ts';
import { wallKind } from './wall.ts';

export const PART_KINDS: { readonly [K in PartKind]: PartKindRules<Extract<Part, { kind: K }>> } = {
  wall: wallKind,
  rectangle: rectangleKind,
  disc: discKind,
  ring: ringKind,
  polygon: polygonKind,
  stroke: strokeKind,
};

/** The rules of a part's own kind. The table above pairs them, which the type checker cannot follow through a union. */
export function rulesOf(part: Part): PartKindRules<Part> {
  return PART_KINDS[part.kind] as unknown as PartKindRules<Part>;
}

export function listHandles(part: Part, values: NamedValues): readonly Handle[] {
  return rulesOf(part).handles(part, values);
}

/** The part with one handle moved to (x, y) metres; unchanged when it has no such handle or the move makes no sense. */
export function dragHandle(part: Part, handle: string, x: number, y: number, values: NamedValues): Part {
  const at: XY = [x, y];
  return rulesOf(part).drag(part, handle, at, values);
}

export function movePart(part: Part, dxMetres: number, dyMetres: number): Part {
  return rulesOf(part).move(part, dxMetres, dyMetres);
}

export function listDimensions(part: Part, values: NamedValues): readonly PartDimension[] {
  return rulesOf(part).dimensions(part, values);
}

export function setDimension(part: Part, name: string, text: string, values: NamedValues): Result<Part> {
  return rulesOf(part).setDimension(part, name, text, values);
}

/** What follows the part's name in the Brief. */
export function describePart(part: Part): readonly Phrase[] {
  return rulesOf(part).sentence(part);
}
