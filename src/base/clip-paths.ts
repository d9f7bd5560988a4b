// Owns unions, differences and offsets of polygons on whole-number coordinates, through the clipping library.
// Must not know parts, sheets or units.
// The library's modules are taken one by one: its index pulls in four times what is needed.
import { ClipType, FillRule, PathType, type Paths64 } from 'clipper2-ts/dist/Core.js';
import { Clipper64 } from 'clipper2-ts/dist/Engine.js';
import { ClipperOffset, EndType, JoinType } from 'clipper2-ts/dist/Offset.js';

export type WholePaths = Paths64;

function combine(how: ClipType, subject: WholePaths, clip: WholePaths): WholePaths {
  const clipper = new Clipper64();
  clipper.addPaths(subject, PathType.Subject);
  if (clip.length > 0) clipper.addPaths(clip, PathType.Clip);
  const solution: WholePaths = [];
  clipper.execute(how, FillRule.NonZero, solution);
  return solution;
}

/** All by the nonzero rule; what comes back has outer rings counter-clockwise and holes clockwise. */
export function unite(a: WholePaths, b: WholePaths = []): WholePaths {
  return combine(ClipType.Union, a, b);
}

export function subtract(a: WholePaths, b: WholePaths): WholePaths {
  return combine(ClipType.Difference, a, b);
}

export function intersect(a: WholePaths, b: WholePaths): WholePaths {
  return combine(ClipType.Intersection, a, b);
}

export type LineEnds = 'square' | 'round' | 'joined';

const END_TYPES = { square: EndType.Butt, round: EndType.Round, joined: EndType.Joined } as const;

/**
 * Lines given a half width. Corners are mitred up to `mitreLimit` half widths, or round with arcs that miss the circle by at
 * most `arcTolerance`.
 */
export function thicken(
  lines: WholePaths,
  halfWidth: number,
  ends: LineEnds,
  corners: { readonly mitreLimit: number } | { readonly arcTolerance: number },
): WholePaths {
  const mitred = 'mitreLimit' in corners;
  const offset = mitred ? new ClipperOffset(corners.mitreLimit) : new ClipperOffset(2, corners.arcTolerance);
  offset.addPaths(lines, mitred ? JoinType.Miter : JoinType.Round, END_TYPES[ends]);
  const solution: WholePaths = [];
  offset.execute(halfWidth, solution);
  return solution;
}
