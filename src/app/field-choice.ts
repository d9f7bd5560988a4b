// Owns which fields a section has, and what is shown instead of one it has not.
// Must not know stores, frames or the canvas.
import type { FieldComponent, FieldView } from '../../workers/protocol.ts';
import type { Section } from '../model/job.ts';

type Triple = readonly [FieldComponent, FieldComponent, FieldComponent];

/** Out-of-plane field first. */
export function componentsOf(section: Section): Triple {
  return section === 'E out of plane' ? ['Ez', 'Hx', 'Hy'] : ['Hz', 'Ex', 'Ey'];
}

/** The same choice in another section: along the same axis, or the same magnitude. */
export function fieldInSection(view: FieldView, section: Section): FieldView {
  if (view === '|E|' || view === '|H|') return view;
  const [outOfPlane, x, y] = componentsOf(section);
  return view.endsWith('x') ? x : view.endsWith('y') ? y : outOfPlane;
}
