// Owns the list of parts as sentences, folded into rows when there are many, and the words that add a part.
// Must not know any kind of part.
import { useJobStore } from '../../app/job-store.ts';
import { useViewStore } from '../../app/view-store.ts';
import type { PartKind } from '../../model/job.ts';
import { PART_KINDS } from '../../model/parts/registry.ts';
import { addPart } from './additions.ts';
import { AddLink, AddLinks } from './AddLinks.tsx';
import { MaterialChoice } from './MaterialChoice.tsx';
import { addOwnMaterial, OwnMaterials } from './OwnMaterials.tsx';
import { PartLine, PartRow } from './PartLine.tsx';
import { SaidHere } from './SaidHere.tsx';

/** Past a dozen, sentences become rows. */
const MOST_SENTENCES = 12;
const KINDS = Object.keys(PART_KINDS) as PartKind[];

export function TheParts() {
  const parts = useJobStore((state) => state.job.parts);
  const selection = useViewStore((state) => state.selection);
  const folded = parts.length > MOST_SENTENCES;
  return (
    <section aria-labelledby="brief-parts">
      <h2 className="heading" id="brief-parts">
        The parts
      </h2>
      {parts.length === 0 ? <p className="soft">The sheet is empty. Draw a part, or begin with an example.</p> : null}
      {parts.length > 1 ? <p className="soft hint">Painted in this order, the later one on top.</p> : null}
      {parts.map((part, index) =>
        folded && !selection.includes(part.id) ? (
          <PartRow key={part.id} part={part} />
        ) : (
          <PartLine key={part.id} part={part} index={index} last={index === parts.length - 1} />
        ),
      )}
      <OwnMaterials />
      <SaidHere place="parts" />
      <AddParts />
    </section>
  );
}

function AddParts() {
  const paint = useViewStore((state) => state.paint);
  const drawing = useViewStore((state) => (state.tool.kind === 'draw' ? state.tool.part : null));
  const setTool = useViewStore((state) => state.setTool);
  const setPaint = useViewStore((state) => state.setPaint);
  return (
    <>
      <AddLinks>
        {KINDS.map((kind) => (
          <AddLink
            key={kind}
            label={PART_KINDS[kind].label}
            pressed={drawing === kind}
            onDraw={() => setTool(drawing === kind ? { kind: 'select' } : { kind: 'draw', part: kind })}
            onAdd={() => addPart(kind)}
          />
        ))}
        <AddLink label="own material" onAdd={addOwnMaterial} />
      </AddLinks>
      <p className="soft hint">
        New parts are of <MaterialChoice label="Material of new parts" value={paint} after="." onChoose={setPaint} /> Rows of a
        spreadsheet paste as parts: kind, material, lengths.
      </p>
    </>
  );
}
