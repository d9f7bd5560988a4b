// Owns choosing a material in a sentence, and the swatch that stands for it.
// Must not know which materials there are.
import { useShallow } from 'zustand/react/shallow';
import { findMaterial } from '../../model/materials/library.ts';
import { useJobStore } from '../../app/job-store.ts';
import { ChoiceShell } from './Choice.tsx';
import { MATERIAL_GROUPS, swatchOf } from './materials.ts';

interface MaterialChoiceProps {
  readonly label: string;
  readonly value: string;
  /** The comma or full stop that must stay on its line. */
  readonly after?: string;
  onChoose(id: string): void;
}

export function MaterialChoice({ label, value, after = '', onChoose }: MaterialChoiceProps) {
  const own = useJobStore((state) => state.job.materials);
  const source = useJobStore((state) => findMaterial(state.job, value)?.source);
  return (
    <ChoiceShell label={label} value={value} title={source} after={after} onChoose={onChoose}>
      {own.length === 0 ? null : (
        <optgroup label="Own materials">
          {own.map(({ id, name }) => (
            <option key={id} value={id}>
              {name}
            </option>
          ))}
        </optgroup>
      )}
      {MATERIAL_GROUPS.map((group) => (
        <optgroup key={group.label} label={group.label}>
          {group.materials.map(({ id, name }) => (
            <option key={id} value={id}>
              {name}
            </option>
          ))}
        </optgroup>
      ))}
    </ChoiceShell>
  );
}

export function useCentreHertz(): number {
  return useJobStore((state) =>
    state.resolved.ok ? (state.resolved.value.band.fromHertz + state.resolved.value.band.toHertz) / 2 : 1e9,
  );
}

export function MaterialSwatch({ material }: { readonly material: string }) {
  const centre = useCentreHertz();
  const swatch = useJobStore(useShallow((state) => swatchOf(findMaterial(state.job, material), centre)));
  const tint = swatch.kind === 'tint' ? `${Math.round(100 * swatch.strength)}%` : '0%';
  return (
    <span
      className="swatch"
      data-kind={swatch.kind}
      aria-hidden="true"
      style={swatch.kind === 'tint' ? { background: `color-mix(in oklab, var(--dielectric) ${tint}, transparent)` } : undefined}
    />
  );
}
