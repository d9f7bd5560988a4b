// Owns the one way in for job documents: text or object, any version, to a whole valid job or the reasons why not.
// Must not know files, stores, or the grid.
import type { AppError, Result } from '../base/result.ts';
import { fail, ok } from '../base/result.ts';
import { findNearestWord } from '../base/nearest-word.ts';
import { completeJob } from './complete-job.ts';
import type { EdgeName, Job } from './job.ts';
import { JOB_SCHEMA, LIMITS } from './job-schema.ts';
import { findMaterial, isLibraryMaterial, listMaterialIds } from './materials/library.ts';
import { CURRENT_VERSION, migrateJob } from './migrations.ts';
import { makeNumberReader } from './number-reader.ts';
import { copyPlainData } from './plain-data.ts';
import { checkQuantities } from './resolve-job.ts';
import { describeIssues } from './schema-faults.ts';
import { shareJob } from './share-structure.ts';

const MOST_ERRORS = 20;

function failWith(errors: readonly AppError[]): Result<never> {
  const [first, ...others] = errors.slice(0, MOST_ERRORS);
  return fail(
    first ?? { code: 'form', message: 'The document is not a job.', hint: 'Compare it with the published schema.' },
    ...others,
  );
}

function parseText(text: string): Result<unknown> {
  if (text.length > LIMITS.textCharacters) {
    return fail({
      code: 'too large',
      message: `The document has ${text.length} characters; at most ${LIMITS.textCharacters} are read.`,
      hint: 'Thin freehand strokes and samples, or split the job.',
    });
  }
  try {
    return ok(JSON.parse(text.replace(/^\uFEFF/, '')));
  } catch (error) {
    const reason = error instanceof Error ? error.message.slice(0, 160) : '';
    return fail({
      code: 'not json',
      message: `The document is not JSON (${reason}).`,
      hint: 'Look there for a missing bracket, quote or comma; the file may be cut short.',
    });
  }
}

function readVersion(document: object): Result<number> {
  const version: unknown = 'guidewall' in document ? document.guidewall : undefined;
  if (version === undefined) {
    return fail({
      code: 'not a job',
      path: 'guidewall',
      message: 'This is not a Guidewall job: it has no version.',
      hint: `Add "guidewall": ${CURRENT_VERSION} if it is one.`,
    });
  }
  if (typeof version !== 'number' || !Number.isInteger(version) || version < 0) {
    const shown = JSON.stringify(version).slice(0, 40);
    return fail({
      code: 'form',
      path: 'guidewall',
      message: `${shown} is not a version.`,
      hint: `Write "guidewall": ${CURRENT_VERSION}.`,
    });
  }
  if (version > CURRENT_VERSION) {
    return fail({
      code: 'too new',
      path: 'guidewall',
      message: `The job is of version ${version}; this program reads up to version ${CURRENT_VERSION}.`,
      hint: 'Open it with a newer Guidewall.',
    });
  }
  return ok(version);
}

/**
 * A job from a file's text or from data: migrated, checked, defaults filled. Its quantities all read; whether they fit
 * together (probes on the sheet, band the right way round) is for `resolveJob`. Never throws.
 */
export function parseJob(input: unknown): Result<Job> {
  const raw = typeof input === 'string' ? parseText(input) : ok(input);
  if (!raw.ok) return raw;
  const document = copyPlainData(raw.value);
  if (!document.ok) return document;
  if (typeof document.value !== 'object' || document.value === null || Array.isArray(document.value)) {
    return fail({
      code: 'not a job',
      message: 'The document is not an object.',
      hint: 'A job starts with { and "guidewall": 1.',
    });
  }
  const version = readVersion(document.value);
  if (!version.ok) return version;
  const { $schema: schemaName, ...plain } = document.value as Record<string, unknown>;
  if (schemaName !== undefined && typeof schemaName !== 'string') {
    return fail({ code: 'form', path: '$schema', message: 'The name of the schema is not a text.', hint: 'Remove it.' });
  }
  return validateJob(migrateJob(plain, version.value));
}

/** Checks plain data of the current version. The job keeps the pieces of `former` that are equal. */
export function validateJob(document: unknown, former?: Job): Result<Job> {
  const parsed = JOB_SCHEMA.safeParse(document);
  if (!parsed.success) return failWith(describeIssues(parsed.error.issues, document));
  const completed = completeJob(parsed.data);
  const job = former === undefined ? completed : shareJob(former, completed);
  const faults = [...findRepeatedIds(job), ...findUnknownMaterials(job), ...findUnpairedEdges(job), ...findSampleFaults(job)];
  if (faults.length > 0) return failWith(faults);
  const reader = makeNumberReader(job.values);
  checkQuantities(job, reader);
  return reader.faults.length > 0 ? failWith(reader.faults) : ok(job);
}

function findRepeatedIds(job: Job): AppError[] {
  const seen = new Map<string, string>();
  const faults: AppError[] = [];
  for (const list of ['parts', 'drives', 'probes', 'materials'] as const) {
    for (const [k, { id }] of job[list].entries()) {
      const path = `${list}[${k}].id`;
      const first = seen.get(id);
      if (first !== undefined) {
        faults.push({
          code: 'id',
          path,
          message: `The id "${id}" is taken by ${first}.`,
          hint: 'Give each thing an id of its own.',
        });
      } else if (list === 'materials' && isLibraryMaterial(id)) {
        faults.push({
          code: 'id',
          path,
          message: `The id "${id}" belongs to the library.`,
          hint: 'Give your own material another id.',
        });
      }
      seen.set(id, first ?? `${list}[${k}]`);
    }
  }
  return faults;
}

function findUnknownMaterials(job: Job): AppError[] {
  const uses = [
    { id: job.sheet.background, path: 'sheet.background' },
    ...job.parts.map((part, k) => ({ id: part.material, path: `parts[${k}].material` })),
  ];
  const unknown = uses.filter(({ id }) => findMaterial(job, id) === undefined).slice(0, MOST_ERRORS);
  return unknown.map(({ id, path }) => {
    const nearest = findNearestWord(id, listMaterialIds(job));
    const mend = 'Choose one from the library, or add it to the job\u2019s own materials.';
    const hint = nearest === undefined ? mend : `Did you mean "${nearest}"?`;
    return { code: 'material', path, message: `There is no material "${id}".`, hint };
  });
}

const OPPOSITE_EDGES: readonly (readonly [EdgeName, EdgeName])[] = [
  ['left', 'right'],
  ['bottom', 'top'],
];

function findUnpairedEdges(job: Job): AppError[] {
  const { edges } = job.sheet;
  return OPPOSITE_EDGES.filter(([a, b]) => (edges[a] === 'repeating') !== (edges[b] === 'repeating')).map(([a, b]) => {
    const [repeating, other] = edges[a] === 'repeating' ? [a, b] : [b, a];
    return {
      code: 'edges',
      path: `sheet.edges.${other}`,
      message: `The ${repeating} edge repeats but the ${other} edge is ${edges[other]}.`,
      hint: `Repeating edges come in pairs: make both ${a} and ${b} repeating, or neither.`,
    };
  });
}

function findSampleFaults(job: Job): AppError[] {
  return job.drives.flatMap(({ waveform }, k) => {
    if (waveform.kind !== 'samples') return [];
    const { times, values } = waveform;
    const path = `drives[${k}].waveform`;
    if (times.length !== values.length) {
      const message = `There are ${times.length} times but ${values.length} values.`;
      return [{ code: 'samples', path: `${path}.values`, message, hint: 'Give one value for each time.' }];
    }
    const fall = times.findIndex((time, i) => time < 0 || (i > 0 && time <= (times[i - 1] ?? 0)));
    if (fall < 0) return [];
    const message = `The time ${times[fall]} does not rise from the one before.`;
    return [{ code: 'samples', path: `${path}.times[${fall}]`, message, hint: 'Give times in seconds, rising from 0.' }];
  });
}
