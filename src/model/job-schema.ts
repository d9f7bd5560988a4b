// Owns the one description of a job document: the validator and the published JSON Schema both come from it.
// Must not know how quantities are evaluated, how parts are drawn, or who asks.
import { z } from 'zod';
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
  return z
    .string({ error: `must be a text with a number and its unit.\nWrite it like "${example}".` })
    .min(1, { error: `is empty.\nWrite it like "${example}".` })
    .max(LIMITS.quantityCharacters, {
      error: `is longer than ${LIMITS.quantityCharacters} characters.\nGive parts of it a name under "values".`,
    })
    .meta({ examples: [example] });
}

const CONTROL = /[\p{Cc}\u2028\u2029]/u;
const oneLine = z
  .string()
  .max(LIMITS.nameCharacters, { error: `is longer than ${LIMITS.nameCharacters} characters.\nShorten it.` })
  .refine((text) => !CONTROL.test(text), { error: 'holds a line break or another control character.\nWrite it on one line.' });
const id = z
  .string()
  .max(LIMITS.idCharacters, { error: `is longer than ${LIMITS.idCharacters} characters.\nShorten it.` })
  .regex(/^[\p{L}\p{N}][\p{L}\p{N} ._-]*$/u, { error: 'is not an id.\nUse letters, digits, spaces, and . _ - after the first.' });

const length = quantity('length');
const point = z.tuple([length, length]).describe('x to the right, y up, from the origin of the sheet');
const points = z
  .array(point)
  .max(LIMITS.pointsPerPart, { error: `has more than ${LIMITS.pointsPerPart} points.\nSplit the part or thin the points.` });

const partBase = {
  id: id.optional(),
  name: oneLine.optional(),
  material: id.default('perfect-metal').describe('Id of a library entry or of one of the job\u2019s own materials'),
  leftOutOfReference: z.boolean().default(false).describe('True when the reference run is made without this part'),
};
const twoPoints = points.min(2, { error: 'has fewer than 2 points.\nGive at least two.' });
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
    from: quantity('angle').default('0 deg'),
    to: quantity('angle').default('360 deg'),
  }),
  strict({
    kind: z.literal('polygon'),
    ...partBase,
    points: points.min(3, { error: 'has fewer than 3 points.\nGive at least three.' }),
  }),
  strict({
    kind: z.literal('stroke'),
    ...partBase,
    points: points.min(1, { error: 'has no points.\nGive at least one.' }),
    width: length,
  }),
]);

const samples = z.array(z.number()).min(2, { error: 'has fewer than 2 samples.\nGive at least two.' });
const waveform = z.discriminatedUnion('kind', [
  strict({ kind: z.literal('band pulse') }),
  strict({ kind: z.literal('continuous wave'), frequency: quantity('frequency') }),
  strict({ kind: z.literal('damped step'), rise: quantity('time'), decay: quantity('time') }),
  strict({
    kind: z.literal('samples'),
    name: oneLine.default('samples'),
    times: samples.max(LIMITS.samples, { error: `has more than ${LIMITS.samples} samples.\nThin them.` }),
    values: samples.max(LIMITS.samples, { error: `has more than ${LIMITS.samples} samples.\nThin them.` }),
  }),
]);
const driveBase = { id: id.optional(), name: oneLine.optional(), waveform: waveform.default({ kind: 'band pulse' }) };
const drive = z.discriminatedUnion('kind', [
  strict({
    kind: z.literal('plane wave'),
    ...driveBase,
    amplitude: quantity('field').default('1 V/m').describe('Peak electric field'),
    angle: quantity('angle').default('0 deg').describe('Direction of travel, counter-clockwise from +x'),
  }),
  strict({
    kind: z.literal('line current'),
    ...driveBase,
    at: point,
    amplitude: z
      .string()
      .min(1)
      .max(LIMITS.quantityCharacters)
      .optional()
      .describe('Peak: A when E is out of the plane, V when H is'),
  }),
]);
const probe = strict({ id: id.optional(), name: oneLine.optional(), at: point });
const material = strict({
  id,
  name: oneLine.optional(),
  permittivity: z.number().min(1, { error: 'is below 1.\nGive the relative permittivity, 1 or more.' }).max(1e6),
  permeability: z.number().min(1, { error: 'is below 1.\nGive the relative permeability, 1 or more.' }).max(1e6).default(1),
  conductivity: z.number().min(0, { error: 'is negative.\nGive S/m, 0 or more.' }).max(1e12).default(0).describe('S/m'),
  magneticLoss: z.number().min(0, { error: 'is negative.\nGive ohm/m, 0 or more.' }).max(1e15).default(0).describe('ohm/m'),
});

const edge = z.enum(['absorbing', 'metal', 'magnetic', 'repeating']).default('absorbing');
const cells = z.union([strict({ perWavelength: z.number().min(4).max(200) }), strict({ x: length, y: length })], {
  error: 'gives no cell size.\nWrite { "perWavelength": 20 } with 4 to 200, or { "x": "1 mm", "y": "1 mm" }.',
});

export const JOB_SCHEMA = strict({
  guidewall: z.literal(1).describe('Version of the document'),
  title: oneLine.default('Untitled'),
  notes: z.string().max(LIMITS.notesCharacters).default(''),
  section: z.enum(['E out of plane', 'H out of plane']).describe('Which field points out of the plane of the section'),
  band: strict({
    from: quantity('frequency'),
    to: quantity('frequency'),
    points: z.int().min(2).max(20001).default(201).describe('Number of frequencies, evenly spaced, both ends included'),
    listed: z
      .array(quantity('frequency'))
      .max(LIMITS.listedFrequencies)
      .default([])
      .describe('Spot frequencies of special interest'),
  }),
  sheet: strict({
    width: length,
    height: length,
    origin: point.default(['0 mm', '0 mm']).describe('Where the origin stands, from the lower left corner'),
    background: id.default('air').describe('Material id'),
    edges: strict({ left: edge, right: edge, bottom: edge, top: edge }).prefault({}),
  }),
  grid: strict({
    cells: cells.default({ perWavelength: 20 }),
    absorberCells: z.int().min(4).max(64).default(12).describe('Depth of an absorbing edge in cells'),
    courant: z.number().min(0.1).max(0.99).default(0.99).describe('Fraction of the largest stable time step'),
  }).prefault({}),
  values: z
    .record(
      z.string().refine(isValueName, {
        error:
          'cannot name a value.\nUse letters, digits and _, at most 40, not starting with a digit, and none of pi, c0, sqrt, min, max, abs, sin, cos, tan.',
      }),
      z.string().min(1).max(LIMITS.quantityCharacters),
    )
    .refine((values) => Object.keys(values).length <= LIMITS.values, {
      error: `has more than ${LIMITS.values} names.\nRemove some.`,
    })
    .default({}),
  materials: z.array(material).max(LIMITS.materials).default([]),
  parts: z
    .array(part)
    .max(LIMITS.parts, { error: `has more than ${LIMITS.parts} parts.\nJoin some into polygons.` })
    .default([])
    .describe('Painted in order, the later one on top'),
  drives: z
    .array(drive)
    .max(LIMITS.drives, { error: `has more than ${LIMITS.drives} drives.\nRemove some.` })
    .default([]),
  probes: z
    .array(probe)
    .max(LIMITS.probes, { error: `has more than ${LIMITS.probes} probes.\nRemove some.` })
    .default([]),
  reference: z.enum(['without marked parts', 'empty sheet', 'none']).default('without marked parts'),
  stop: strict({
    decay: quantity('decibel').default('60 dB').describe('How far the energy must fall below its peak, or "never"'),
    after: quantity('time').optional().describe('Longest time simulated; chosen from the sheet and the band when left out'),
  }).prefault({}),
});

/** A job as the schema lets it through: ids, names and a few values may still be missing. */
export type DraftJob = z.output<typeof JOB_SCHEMA>;
