// Owns what every kind of part must be able to do.
// Must not know any kind in particular, the grid, or how parts look on screen.
import type { AppError, Result } from '../../base/result.ts';
import { fail, ok } from '../../base/result.ts';
import { addQuantityTexts } from '../../base/edit-quantity.ts';
import type { NamedValues } from '../../base/quantity.ts';
import { makeNumberReader } from '../number-reader.ts';
import type { NumberReader } from '../number-reader.ts';
import type { Outline, Part, XY } from '../job.ts';

/** A point that can be dragged; names are stable: "centre", "radius", "point 3", "left bottom". */
export interface Handle {
  readonly name: string;
  readonly at: XY;
}

/** A measure to draw on the sheet from point to point; setting it by `setDimension` edits the quantity at `path`. */
export interface PartDimension {
  readonly name: string;
  readonly from: XY;
  readonly to: XY;
  /** Metres; radians for the angles of a ring. */
  readonly value: number;
  readonly dimension: 'length' | 'angle';
  /** Within the part: `thickness`, `to[0]`. */
  readonly path: string;
}

/** The rest of the sentence that begins with the part's name: words, and values that can be edited in place. */
export type Phrase =
  | { readonly text: string }
  | { readonly path: readonly (string | number)[]; readonly as: 'length' | 'angle' | 'point' | 'material' };

/** What a kind's file defines. `Shape` is the part in metres and radians. */
export interface PartKindDefinition<P extends Part, Shape> {
  readonly kind: P['kind'];
  /** As a heading or a button names it. */
  readonly label: string;
  readonly readShape: (part: P, reader: NumberReader, path: string) => Shape;
  /** What is wrong with a shape whose numbers are each good. */
  readonly findFault: (shape: Shape, path: string) => AppError | null;
  readonly outline: (shape: Shape) => Outline;
  readonly smallestMetres: (shape: Shape) => number;
  readonly handles: (shape: Shape) => readonly Handle[];
  /** The part with that handle moved to (x, y) metres. */
  readonly drag: (part: P, shape: Shape, handle: string, at: XY, values: NamedValues) => P;
  readonly move: (part: P, dxMetres: number, dyMetres: number) => P;
  readonly dimensions: (shape: Shape) => readonly PartDimension[];
  /** The part with the named dimension made to be `text`, a good length or angle above zero worth `value`. */
  readonly setDimension: (part: P, shape: Shape, name: string, text: string, value: number) => P;
  readonly sentence: (part: P) => readonly Phrase[];
}

export interface DrawnPart {
  readonly outline: Outline;
  readonly smallestMetres: number;
}

/** A definition with its shape hidden: works on the part as written. */
export interface PartKindRules<P extends Part> {
  readonly kind: P['kind'];
  readonly label: string;
  readonly sentence: (part: P) => readonly Phrase[];
  readonly move: (part: P, dxMetres: number, dyMetres: number) => P;
  /** Notes in `reader` every quantity that cannot be read. */
  readonly check: (part: P, reader: NumberReader, path: string) => void;
  readonly draw: (part: P, reader: NumberReader, path: string) => Result<DrawnPart>;
  readonly handles: (part: P, values: NamedValues) => readonly Handle[];
  readonly drag: (part: P, handle: string, at: XY, values: NamedValues) => P;
  readonly dimensions: (part: P, values: NamedValues) => readonly PartDimension[];
  readonly setDimension: (part: P, name: string, text: string, values: NamedValues) => Result<P>;
}

export function makePartKind<P extends Part, Shape>(definition: PartKindDefinition<P, Shape>): PartKindRules<P> {
  const shapeOf = (part: P, values: NamedValues): Shape | null => {
    const reader = makeNumberReader(values);
    const shape = definition.readShape(part, reader, '');
    return reader.faults.length === 0 ? shape : null;
  };
  return {
    kind: definition.kind,
    label: definition.label,
    sentence: definition.sentence,
    move: definition.move,
    check: (part, reader, path) => {
      definition.readShape(part, reader, path);
    },
    draw: (part, sharedReader, path) => {
      const reader = sharedReader.fork();
      const shape = definition.readShape(part, reader, path);
      const [first, ...others] = reader.faults;
      if (first !== undefined) return fail(first, ...others);
      const fault = definition.findFault(shape, path);
      if (fault !== null) return fail(fault);
      const outline = definition.outline(shape);
      if (outline.length === 0) {
        return fail({
          code: 'shape',
          path: path.replace(/\.$/, ''),
          message: 'The part encloses no area.',
          hint: 'Move its points apart, or remove it.',
        });
      }
      return ok({ outline, smallestMetres: definition.smallestMetres(shape) });
    },
    handles: (part, values) => {
      const shape = shapeOf(part, values);
      return shape === null ? [] : definition.handles(shape);
    },
    drag: (part, handle, at, values) => {
      const shape = shapeOf(part, values);
      return shape === null ? part : definition.drag(part, shape, handle, at, values);
    },
    dimensions: (part, values) => {
      const shape = shapeOf(part, values);
      return shape === null ? [] : definition.dimensions(shape);
    },
    setDimension: (part, name, text, values) => {
      const shape = shapeOf(part, values);
      const wanted = shape === null ? undefined : definition.dimensions(shape).find((dimension) => dimension.name === name);
      if (shape === null || wanted === undefined) {
        return fail({
          code: 'dimension',
          message: `The part has no dimension called "${name}".`,
          hint: 'Choose one shown on the sheet.',
        });
      }
      const reader = makeNumberReader(values);
      const value = reader.read(text, wanted.dimension, wanted.path, wanted.dimension === 'length' ? 'size' : 'any');
      const [fault] = reader.faults;
      return fault === undefined ? ok(definition.setDimension(part, shape, name, text.trim(), value)) : fail(fault);
    },
  };
}

/** Coordinate `text` away from `base`, on the side where it lies now. */
export function offsetCoordinate(base: string, text: string, baseMetres: number, nowMetres: number): string {
  return addQuantityTexts(base, text, nowMetres >= baseMetres ? 1 : -1, 'length');
}
