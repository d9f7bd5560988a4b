// Owns the one description of a job document: the validator and the published JSON Schema both come from it.
// Must not know how quantities are evaluated, how parts are drawn, or who asks.
import * as z from 'zod/mini';
import { DIMENSION_EXAMPLES } from '../base/units.ts';
import type { Dimension } from '../base/units.ts';
import { isValueName } from '../base/quantity.ts';
import { findNearestWord } from '../base/nearest-word.ts';

// A strict content policy forbids compiled validators; without this each start would log a refused attempt.
z.config({ jitless: true });

export const LIMITS = {
  textCharacters: 20_000_000,
  parts: 2000,
  pointsPerPart: 10_000,
  probes: 256,
  drives: 16,
  materials: 200,
  values: 500,
  listedFrequencies: 1000,
  samples: 200_000,
  nameCharacters: 200,
  idCharacters: 80,
  notesCharacters: 20_000,
  quantityCharacters: 200,
} as const;

/** Messages are two lines: what is wrong, and the mend. `describeIssue` takes them apart again. */
function strict<Shape extends z.core.$ZodLooseShape>(shape: Shape) {
  return z.strictObject(shape, {
    error: (issue) => {
      if (issue.code !== 'unrecognized_keys') return undefined;
      const known = Object.keys(shape);
      const strange = issue.keys[0] ?? '';
      const nearest = findNearestWord(strange, known);
      const mend = nearest === undefined ? `Known here: ${known.join(', ')}.` : `Did you mean "${nearest}"?`;
      return `The key "${strange.slice(0, 60)}" is not known here.\n${mend}`;
    },
  });
}

function quantity(dimension: Dimension) {
  const example = DIMENSION_EXAMPLES[dimension];
  return z.string({ error: `must be a text with a number and its unit.\nWrite it like "${example}".` }).check(
    z.minLength(1, { error: `is empty.\nWrite it like "${example}".` }),
    z.maxLength(LIMITS.quantityCharacters, {
      error: `is longer than ${LIMITS.quantityCharacters} characters.\nGive parts of it a name under "values".`,
    }),
    z.meta({ examples: [example] }),
  );
}

function number(least: number, most: number, tooSmall?: string) {
  return z.number().check(z.minimum(least, tooSmall === undefined ? {} : { error: tooSmall }), z.maximum(most));
}

function wholeNumber(least: number, most: number) {
  return z.int().check(z.minimum(least), z.maximum(most));
}

function atMost(limit: number, what: string, mend: string) {
  return z.maxLength(limit, { error: `has more than ${limit} ${what}.\n${mend}` });
}

const CONTROL = /[\p{Cc}\u2028\u2029]/u;
const oneLine = z.string().check(
  z.maxLength(LIMITS.nameCharacters, { error: `is longer than ${LIMITS.nameCharacters} characters.\nShorten it.` }),
  z.refine((text) => !CONTROL.test(text), {
    error: 'holds a line break or another control character.\nWrite it on one line.',
  }),
);
const id = z.string().check(
  z.maxLength(LIMITS.idCharacters, { error: `is longer than ${LIMITS.idCharacters} characters.\nShorten it.` }),
  z.regex(/^[\p{L}\p{N}][\p{L}\p{N} ._-]*$/u, {
    error: 'is not an id.\nUse letters, digits, spaces, and . _ - after the first.',
  }),
);

const length = quantity('length');
const point = z.tuple([length, length]).check(z.describe('x to the right, y up, from the origin of the sheet'));
const points = z.array(point).check(atMost(LIMITS.pointsPerPart, 'points', 'Split the part or thin the points.'));

const partBase = {
  id: z.optional(id),
  name: z.optional(oneLine),
  material: z._default(id, 'perfect-metal').check(z.describe('Id of a library entry or of one of the job\u2019s own materials')),
  leftOutOfReference: z._default(z.boolean(), false).check(z.describe('True when the reference run is made without this part')),
};
const twoPoints = points.check(z.minLength(2, { error: 'has fewer than 2 points.\nGive at least two.' }));
const part = z.discriminatedUnion('kind', [
  strict({ kind: z.literal('wall'), ...partBase, points: twoPoints, thickness: length }),
  strict({ kind: z.literal('rectangle'), ...partBase, from: point, to: point }),
  strict({ kind: z.literal('disc'), ...partBase, centre: point, radius: length }),
  strict({
    kind: z.literal('ring'),
    ...partBase,
    centre: point,
    inner: length,
    outer: length,
    from: z._default(quantity('angle'), '0 deg'),
    to: z._default(quantity('angle'), '360 deg'),
  }),
  strict({
    kind: z.literal('polygon'),
    ...partBase,
    points: points.check(z.minLength(3, { error: 'has fewer than 3 points.\nGive at least three.' })),
  }),
  strict({
    kind: z.literal('stroke'),
    ...partBase,
    points: points.check(z.minLength(1, { error: 'has no points.\nGive at least one.' })),
    width: length,
  }),
]);

const samples = z
  .array(z.number())
  .check(
    z.minLength(2, { error: 'has fewer than 2 samples.\nGive at least two.' }),
    atMost(LIMITS.samples, 'samples', 'Thin them.'),
  );
const waveform = z.discriminatedUnion('kind', [
  strict({ kind: z.literal('band pulse') }),
  strict({ kind: z.literal('continuous wave'), frequency: quantity('frequency') }),
  strict({ kind: z.literal('damped step'), rise: quantity('time'), decay: quantity('time') }),
  strict({
    kind: z.literal('samples'),
    name: z._default(oneLine, 'samples'),
    times: samples,
    values: samples,
  }),
]);
const driveBase = { id: z.optional(id), name: z.optional(oneLine), waveform: z._default(waveform, { kind: 'band pulse' }) };
const drive = z.discriminatedUnion('kind', [
  strict({
    kind: z.literal('plane wave'),
    ...driveBase,
    amplitude: z._default(quantity('field'), '1 V/m').check(z.describe('Peak electric field')),
    angle: z._default(quantity('angle'), '0 deg').check(z.describe('Direction of travel, counter-clockwise from +x')),
  }),
  strict({
    kind: z.literal('line current'),
    ...driveBase,
    at: point,
    amplitude: z
      .optional(z.string().check(z.minLength(1), z.maxLength(LIMITS.quantityCharacters)))
      .check(z.describe('Peak: A when E is out of the plane, V when H is')),
  }),
]);
const probe = strict({ id: z.optional(id), name: z.optional(oneLine), at: point });
const material = strict({
  id,
  name: z.optional(oneLine),
  permittivity: number(1, 1e6, 'is below 1.\nGive the relative permittivity, 1 or more.'),
  permeability: z._default(number(1, 1e6, 'is below 1.\nGive the relative permeability, 1 or more.'), 1),
  conductivity: z._default(number(0, 1e12, 'is negative.\nGive S/m, 0 or more.'), 0).check(z.describe('S/m')),
  magneticLoss: z._default(number(0, 1e15, 'is negative.\nGive ohm/m, 0 or more.'), 0).check(z.describe('ohm/m')),
});

const edge = z._default(z.enum(['absorbing', 'metal', 'magnetic', 'repeating']), 'absorbing');
const cells = z.union([strict({ perWavelength: number(4, 200) }), strict({ x: length, y: length })], {
  error: 'gives no cell size.\nWrite { "perWavelength": 20 } with 4 to 200, or { "x": "1 mm", "y": "1 mm" }.',
});

const values = z
  .record(
    z.string().check(
      z.refine(isValueName, {
        error:
          'cannot name a value.\nUse letters, digits and _, at most 40, not starting with a digit, and none of pi, c0, sqrt, min, max, abs, sin, cos, tan.',
      }),
    ),
    z.string().check(z.minLength(1), z.maxLength(LIMITS.quantityCharacters)),
  )
  .check(
    z.refine((entries) => Object.keys(entries).length <= LIMITS.values, {
      error: `has more than ${LIMITS.values} names.\nRemove some.`,
    }),
  );

export const JOB_SCHEMA = strict({
  guidewall: z.literal(1).check(z.describe('Version of the document')),
  title: z._default(oneLine, 'Untitled'),
  notes: z._default(z.string().check(z.maxLength(LIMITS.notesCharacters)), ''),
  section: z.enum(['E out of plane', 'H out of plane']).check(z.describe('Which field points out of the plane of the section')),
  band: strict({
    from: quantity('frequency'),
    to: quantity('frequency'),
    points: z._default(wholeNumber(2, 20001), 201).check(z.describe('Number of frequencies, evenly spaced, both ends included')),
    listed: z
      ._default(z.array(quantity('frequency')).check(z.maxLength(LIMITS.listedFrequencies)), [])
      .check(z.describe('Spot frequencies of special interest')),
  }),
  sheet: strict({
    width: length,
    height: length,
    origin: z._default(point, ['0 mm', '0 mm']).check(z.describe('Where the origin stands, from the lower left corner')),
    background: z._default(id, 'air').check(z.describe('Material id')),
    edges: z.prefault(strict({ left: edge, right: edge, bottom: edge, top: edge }), {}),
  }),
  grid: z.prefault(
    strict({
      cells: z._default(cells, { perWavelength: 20 }),
      absorberCells: z._default(wholeNumber(4, 64), 12).check(z.describe('Depth of an absorbing edge in cells')),
      courant: z._default(number(0.1, 0.99), 0.99).check(z.describe('Fraction of the largest stable time step')),
    }),
    {},
  ),
  values: z._default(values, {}),
  materials: z._default(z.array(material).check(z.maxLength(LIMITS.materials)), []),
  parts: z
    ._default(z.array(part).check(atMost(LIMITS.parts, 'parts', 'Join some into polygons.')), [])
    .check(z.describe('Painted in order, the later one on top')),
  drives: z._default(z.array(drive).check(atMost(LIMITS.drives, 'drives', 'Remove some.')), []),
  probes: z._default(z.array(probe).check(atMost(LIMITS.probes, 'probes', 'Remove some.')), []),
  reference: z._default(z.enum(['without marked parts', 'empty sheet', 'none']), 'without marked parts'),
  stop: z.prefault(
    strict({
      decay: z
        ._default(quantity('decibel'), '60 dB')
        .check(z.describe('How far the energy must fall below its peak, or "never"')),
      after: z
        .optional(quantity('time'))
        .check(z.describe('Longest time simulated; chosen from the sheet and the band when left out')),
    }),
    {},
  ),
});

/** A job as the schema lets it through: ids, names and a few values may still be missing. */
export type DraftJob = z.output<typeof JOB_SCHEMA>;
