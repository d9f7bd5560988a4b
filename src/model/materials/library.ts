// Owns the list of materials a job can name, each with its source.
// Must not know jobs beyond their own materials, or the grid.
import type { Job, OwnMaterial } from '../job.ts';
import { BUILDING_MATERIALS } from './building-materials.ts';
import type { BuildingMaterialRow } from './building-materials.ts';
import type { LibraryMaterial } from './material.ts';

const ANY_FREQUENCY: readonly [number, number] = [0, 1e15];

const SPACE: readonly LibraryMaterial[] = [
  {
    id: 'air',
    name: 'air',
    group: 'space',
    law: { kind: 'constant', permittivity: 1, permeability: 1, conductivity: 0, magneticLoss: 0 },
    source: 'definition: taken as vacuum; true air differs by 6e-4 in permittivity (common practice)',
    validity: ANY_FREQUENCY,
    note: 'Paint with air to erase.',
  },
  {
    id: 'vacuum',
    name: 'vacuum',
    group: 'space',
    law: { kind: 'constant', permittivity: 1, permeability: 1, conductivity: 0, magneticLoss: 0 },
    source: 'definition',
    validity: ANY_FREQUENCY,
    note: '',
  },
];

const METAL_SOURCE = 'typical handbook value at 20 \u00b0C, from memory';
const METAL_NOTE = 'Computed as perfect metal: the loss in its skin is left out.';

function makeMetal(id: string, name: string, conductivity: number, permeability = 1): LibraryMaterial {
  return {
    id,
    name,
    group: 'metal',
    law: { kind: 'metal', conductivity, permeability },
    source: METAL_SOURCE,
    // Where displacement current and anomalous skin effect stay out of sight.
    validity: [1e3, 1e12],
    note: permeability === 1 ? METAL_NOTE : `${METAL_NOTE} Its permeability, taken as ${permeability}, falls with frequency.`,
  };
}

const METALS: readonly LibraryMaterial[] = [
  {
    id: 'perfect-metal',
    name: 'perfect metal',
    group: 'metal',
    law: { kind: 'perfect metal' },
    source: 'definition',
    validity: ANY_FREQUENCY,
    note: 'No field inside, no loss.',
  },
  makeMetal('silver', 'silver', 6.3e7),
  makeMetal('copper', 'copper', 5.8e7),
  makeMetal('gold', 'gold', 4.1e7),
  makeMetal('aluminium', 'aluminium', 3.77e7),
  makeMetal('zinc', 'zinc', 1.69e7),
  makeMetal('brass', 'brass', 1.57e7),
  makeMetal('nickel', 'nickel', 1.43e7, 100),
  makeMetal('tin', 'tin', 9.17e6),
  makeMetal('carbon-steel', 'carbon steel', 6.99e6, 100),
  makeMetal('stainless-steel-304', 'stainless steel 304', 1.39e6),
];

const GROUND = new Set(['very dry ground', 'medium dry ground', 'wet ground']);

/** Rows that repeat another entry or are only metal under another name are left out of the list a person chooses from. */
function isOffered(row: BuildingMaterialRow): boolean {
  return row.name !== 'vacuum' && row.name !== 'metal';
}

function makeBuildingMaterial(row: BuildingMaterialRow): LibraryMaterial {
  const current = row.recommendation === 'P.2040-3';
  const slug = row.name.replaceAll(' ', '-');
  return {
    id: current ? slug : `${slug}-${row.recommendation.slice(2)}`,
    name: `${row.name.replace('-mmw', ', mm waves')}${current ? '' : `, ${row.recommendation}`}`,
    group: GROUND.has(row.name) ? 'ground' : 'building material',
    law: { kind: 'power law', a: row.a, b: row.b, c: row.c, d: row.d },
    source: `Rec. ITU-R ${row.recommendation}, Table 3 (${row.source})`,
    validity: [row.fGHz[0] * 1e9, row.fGHz[1] * 1e9],
    note: 'Its permittivity and conductivity vary with frequency; the values at the band\u2019s centre are used.',
  };
}

function makeDielectric(id: string, name: string, permittivity: number, lossTangent: number, atHertz: number): LibraryMaterial {
  return {
    id,
    name,
    group: 'dielectric',
    law: { kind: 'loss tangent', permittivity, lossTangent },
    source: `typical, check the data sheet (from memory, near ${atHertz / 1e9} GHz)`,
    validity: [atHertz / 10, atHertz * 4],
    note: `Loss tangent ${lossTangent}, turned into the conductivity it amounts to at the band\u2019s centre.`,
  };
}

const DIELECTRICS: readonly LibraryMaterial[] = [
  makeDielectric('ptfe', 'PTFE', 2.08, 0.0004, 10e9),
  makeDielectric('polyethylene', 'polyethylene', 2.26, 0.0004, 10e9),
  makeDielectric('polypropylene', 'polypropylene', 2.25, 0.0005, 10e9),
  makeDielectric('polystyrene', 'polystyrene', 2.54, 0.0007, 10e9),
  makeDielectric('polystyrene-foam', 'polystyrene foam', 1.04, 0.0001, 3e9),
  makeDielectric('pmma', 'PMMA', 2.6, 0.006, 10e9),
  makeDielectric('polycarbonate', 'polycarbonate', 2.77, 0.006, 10e9),
  makeDielectric('abs', 'ABS', 2.7, 0.006, 3e9),
  makeDielectric('nylon', 'nylon', 3.0, 0.012, 3e9),
  makeDielectric('epoxy', 'epoxy resin', 3.2, 0.02, 3e9),
  makeDielectric('silicone-rubber', 'silicone rubber', 3.0, 0.01, 3e9),
  makeDielectric('fr-4', 'FR-4', 4.4, 0.02, 1e9),
  makeDielectric('fused-quartz', 'fused quartz', 3.78, 0.0001, 10e9),
  makeDielectric('borosilicate-glass', 'borosilicate glass', 4.6, 0.008, 3e9),
  makeDielectric('alumina-96', 'alumina 96 %', 9.4, 0.0006, 10e9),
  makeDielectric('alumina-99.5', 'alumina 99.5 %', 9.8, 0.0002, 10e9),
  makeDielectric('silicon-high-resistivity', 'silicon, high resistivity', 11.7, 0.001, 10e9),
  makeDielectric('gallium-arsenide', 'gallium arsenide', 12.9, 0.001, 10e9),
];

const LIQUIDS: readonly LibraryMaterial[] = [
  {
    id: 'water-20c',
    name: 'water at 20 \u00b0C',
    group: 'liquid',
    law: { kind: 'debye', epsStatic: 80.21, epsInfinite: 5.6, tauSeconds: 9.36e-12 },
    source: 'U. Kaatze, J. Chem. Eng. Data 34 (1989) 371, single Debye term at 20 \u00b0C (numbers from memory)',
    validity: [1e9, 60e9],
    note: 'Its permittivity and loss vary with frequency; the values at the band\u2019s centre are used.',
  },
];

export const MATERIALS: readonly LibraryMaterial[] = [
  ...SPACE,
  ...METALS,
  ...BUILDING_MATERIALS.filter(isOffered).map(makeBuildingMaterial),
  ...DIELECTRICS,
  ...LIQUIDS,
];

const BY_ID: ReadonlyMap<string, LibraryMaterial> = new Map(MATERIALS.map((material) => [material.id, material]));

function makeOwnLibraryMaterial(own: OwnMaterial): LibraryMaterial {
  return {
    id: own.id,
    name: own.name,
    group: 'own',
    law: {
      kind: 'constant',
      permittivity: own.permittivity,
      permeability: own.permeability,
      conductivity: own.conductivity,
      magneticLoss: own.magneticLoss,
    },
    source: 'given in the job',
    validity: ANY_FREQUENCY,
    note: '',
  };
}

/** A library entry, or one of the job's own materials. */
export function findMaterial(job: Pick<Job, 'materials'>, id: string): LibraryMaterial | undefined {
  const own = job.materials.find((material) => material.id === id);
  return own === undefined ? BY_ID.get(id) : makeOwnLibraryMaterial(own);
}

export function isLibraryMaterial(id: string): boolean {
  return BY_ID.has(id);
}

export function listMaterialIds(job: Pick<Job, 'materials'>): readonly string[] {
  return [...job.materials.map((material) => material.id), ...BY_ID.keys()];
}
