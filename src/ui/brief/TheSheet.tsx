// Owns the sentences on the sheet: size, filling, edges, grid, and what the run will take.
// Must not know how the grid is made.
import { useJobStore } from '../../app/job-store.ts';
import { useRunStore } from '../../app/run-store.ts';
import { formatQuantity } from '../../base/quantity.ts';
import type { EdgeKind, EdgeName, Job } from '../../model/job.ts';
import { Choice } from './Choice.tsx';
import { setValue } from './editing.ts';
import { describeCells, describeCost, describeSharpness, keepUnits } from './estimate-words.ts';
import { MaterialChoice } from './MaterialChoice.tsx';
import { SaidHere } from './SaidHere.tsx';
import { NumberValue, PointValue, QuantityValue } from './values.tsx';

export function TheSheet() {
  const sheet = useJobStore((state) => state.job.sheet);
  return (
    <section aria-labelledby="brief-sheet">
      <h2 className="heading" id="brief-sheet">
        The sheet
      </h2>
      <p>
        It is <QuantityValue path={['sheet', 'width']} text={sheet.width} label="Width of the sheet" dimension="length" /> by{' '}
        <QuantityValue path={['sheet', 'height']} text={sheet.height} label="Height of the sheet" dimension="length" /> of{' '}
        <MaterialChoice
          label="What fills the sheet"
          value={sheet.background}
          after="."
          onChoose={(id) => void setValue(['sheet', 'background'], id)}
        />{' '}
        The origin stands at <PointValue path={['sheet', 'origin']} point={sheet.origin} label="Origin" /> from its lower left
        corner.
      </p>
      <EdgeWords edges={sheet.edges} />
      <GridWords />
      <EstimateWords />
      <SaidHere place="sheet" />
    </section>
  );
}

const EDGE_WORDS: readonly (readonly [EdgeKind, string])[] = [
  ['absorbing', 'absorbs'],
  ['metal', 'is metal'],
  ['magnetic', 'is magnetic'],
  ['repeating', 'repeats'],
];

const OPPOSITE: Readonly<Record<EdgeName, EdgeName>> = { left: 'right', right: 'left', bottom: 'top', top: 'bottom' };

/** Edges repeat in pairs: the opposite one goes along, there and back. */
export function chooseEdge(edges: Job['sheet']['edges'], edge: EdgeName, kind: EdgeKind): Job['sheet']['edges'] {
  const paired = kind === 'repeating' || edges[edge] === 'repeating';
  return { ...edges, [edge]: kind, ...(paired ? { [OPPOSITE[edge]]: kind } : {}) };
}

function EdgeWords({ edges }: { readonly edges: Job['sheet']['edges'] }) {
  const edge = (name: EdgeName, after: string) => (
    <Choice
      label={`The ${name} edge`}
      after={after}
      value={edges[name]}
      options={EDGE_WORDS}
      onChoose={(kind) => void setValue(['sheet', 'edges'], chooseEdge(edges, name, kind))}
    />
  );
  return (
    <p>
      The left edge {edge('left', ',')} the right {edge('right', ';')} the top {edge('top', ',')} the bottom {edge('bottom', '.')}
    </p>
  );
}

type CellWay = 'per wavelength' | 'typed';

const CELL_WAYS: readonly (readonly [CellWay, string])[] = [
  ['per wavelength', 'as many cells per shortest wavelength as'],
  ['typed', 'cells of the size'],
];

/** Common practice for a Yee grid. */
const CELLS_PER_WAVELENGTH = 20;

function chooseCells(way: CellWay): void {
  const { estimate } = useRunStore.getState();
  const size = (metres: number | undefined): string => formatQuantity(metres ?? 1e-3, 'length', 3);
  const cells =
    way === 'typed'
      ? { x: size(estimate?.dxMetres), y: size(estimate?.dyMetres) }
      : { perWavelength: estimate === null ? CELLS_PER_WAVELENGTH : clampCells(estimate.cellsPerShortestWavelength) };
  setValue(['grid', 'cells'], cells);
}

function clampCells(cells: number): number {
  return Math.min(200, Math.max(4, Math.round(cells)));
}

function GridWords() {
  const grid = useJobStore((state) => state.job.grid);
  const { cells } = grid;
  return (
    <p>
      The grid takes{' '}
      <Choice
        label="How cells are sized"
        value={'perWavelength' in cells ? 'per wavelength' : 'typed'}
        options={CELL_WAYS}
        onChoose={chooseCells}
      />{' '}
      {'perWavelength' in cells ? (
        <NumberValue
          path={['grid', 'cells', 'perWavelength']}
          value={cells.perWavelength}
          label="Cells per shortest wavelength"
        />
      ) : (
        <>
          <QuantityValue path={['grid', 'cells', 'x']} text={cells.x} label="Cell size along x" dimension="length" /> by{' '}
          <QuantityValue path={['grid', 'cells', 'y']} text={cells.y} label="Cell size along y" dimension="length" />
        </>
      )}
      . An absorbing edge is{' '}
      <NumberValue
        path={['grid', 'absorberCells']}
        value={grid.absorberCells}
        label="Depth of an absorbing edge in cells"
        whole
      />{' '}
      cells deep; the Courant factor is <NumberValue path={['grid', 'courant']} value={grid.courant} label="Courant factor" />.
    </p>
  );
}

function EstimateWords() {
  const estimate = useRunStore((state) => state.estimate);
  if (estimate === null) return null;
  return (
    <p className="estimate">
      <strong>{describeCells(estimate)}</strong>; {keepUnits(describeCost(estimate))}. {describeSharpness(estimate)}.
    </p>
  );
}
