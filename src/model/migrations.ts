// Owns the numbered steps from each version of the job document to the next.
// Must not know the current schema: each step knows its two versions only, for ever.

type Plain = Record<string, unknown>;

export interface Migration {
  /** The version it turns into `from + 1`. */
  readonly from: number;
  readonly summary: string;
  readonly migrate: (job: Plain) => Plain;
}

export const CURRENT_VERSION = 1;

/** Drafts wrote `band: [from, to]` and the number of frequencies beside it as `frequencyPoints`. */
const migrateDraft: Migration = {
  from: 0,
  summary: 'the band becomes one object with its number of points',
  migrate: (job) => {
    const { frequencyPoints, band, ...rest } = job;
    const [from, to] = Array.isArray(band) ? (band as readonly unknown[]) : [];
    const points = frequencyPoints === undefined ? {} : { points: frequencyPoints };
    const migrated = Array.isArray(band) ? { from, to, ...points } : band;
    return { ...rest, guidewall: 1, ...(migrated === undefined ? {} : { band: migrated }) };
  },
};

export const MIGRATIONS: readonly Migration[] = [migrateDraft];

/** A document of any known version as one of the current version. */
export function migrateJob(job: Plain, version: number): Plain {
  return MIGRATIONS.filter((step) => step.from >= version).reduce((before, step) => step.migrate(before), job);
}
