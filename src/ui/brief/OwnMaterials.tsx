// Owns the sentences on the job's own materials.
// Must not know the library or how media are computed.
import { useJobStore } from '../../app/job-store.ts';
import { newId, newName } from '../../model/new-job.ts';
import type { OwnMaterial } from '../../model/job.ts';
import { remove } from './additions.ts';
import { tryCommand } from './editing.ts';
import type { Path } from './path-text.ts';
import { SaidHere } from './SaidHere.tsx';
import { Action } from './ThingLine.tsx';
import { NameValue, NumberValue } from './values.tsx';

export function addOwnMaterial(): void {
  const { job } = useJobStore.getState();
  const item: OwnMaterial = {
    id: newId(job, 'material'),
    name: newName(job, 'material', true),
    permittivity: 2.2,
    permeability: 1,
    conductivity: 0,
    magneticLoss: 0,
  };
  tryCommand({ do: 'add', list: 'materials', item });
}

export function OwnMaterials() {
  const materials = useJobStore((state) => state.job.materials);
  return materials.map((material, index) => <OwnMaterialLine key={material.id} material={material} index={index} />);
}

function OwnMaterialLine({ material, index }: { readonly material: OwnMaterial; readonly index: number }) {
  const { id, name, permittivity, permeability, conductivity, magneticLoss } = material;
  const path: Path = ['materials', index];
  return (
    <fieldset className="thing" aria-label={name}>
      <p>
        <NameValue path={[...path, 'name']} text={name} label="Name of the material" /> is a material of permittivity{' '}
        <NumberValue path={[...path, 'permittivity']} value={permittivity} label={`${name}, relative permittivity`} />,
        permeability{' '}
        <NumberValue path={[...path, 'permeability']} value={permeability} label={`${name}, relative permeability`} />,
        conductivity <NumberValue path={[...path, 'conductivity']} value={conductivity} label={`${name}, conductivity in S/m`} />{' '}
        S/m and magnetic loss{' '}
        <NumberValue path={[...path, 'magneticLoss']} value={magneticLoss} label={`${name}, magnetic loss in ohm per metre`} />{' '}
        Ω/m.
      </p>
      <div className="thing-actions">
        <Action label={`Remove ${name}`} words="remove" onAct={() => remove([id], name)} />
      </div>
      <SaidHere place={id} />
    </fieldset>
  );
}
