// Owns what a piece of evidence is: a published value beside the found one, with a tolerance, asserted and kept for the table.
// Must not know the engine or how the rows are found.
import { expect, test } from 'vitest';

export interface EvidenceRow {
  /** What was measured, and on what. */
  readonly case: string;
  /** Where the expected value comes from: a book, a standard, "common practice", "from memory". */
  readonly source: string;
  readonly unit: string;
  readonly expected: number;
  readonly found: number;
  /** Largest |found - expected| allowed, in the same unit; derived where the row is made. */
  readonly tolerance: number;
}

declare module 'vitest' {
  interface TaskMeta {
    evidence?: readonly EvidenceRow[];
  }
}

/** Seconds are typical; the limit only has to end a hang on a loaded machine. */
const TIMEOUT_MILLISECONDS = 120_000;

/** A test whose rows all have to hold; they go to the reporter whether they hold or not. */
export function evidence(title: string, find: () => Promise<readonly EvidenceRow[]>): void {
  test(title, { timeout: TIMEOUT_MILLISECONDS }, async ({ task }) => {
    const rows = await find();
    task.meta.evidence = rows;
    expect(rows.length).toBeGreaterThan(0);
    expect(rows.filter((row) => !holds(row)).map(describeRow)).toEqual([]);
  });
}

/** False for a found value that is not a number. */
export function holds(row: EvidenceRow): boolean {
  return Math.abs(row.found - row.expected) <= row.tolerance;
}

export function describeRow(row: EvidenceRow): string {
  const off = row.found - row.expected;
  return `${row.case}: ${row.found} ${row.unit} instead of ${row.expected} (${row.source}): off by ${off.toExponential(2)}, allowed ${row.tolerance.toExponential(2)}`;
}
