// Owns the shape of an expected failure: plain data that crosses worker and process borders unchanged.
// Must not know anything of the program.

/** What went wrong, where, and how to mend it. `path` is a job path such as `parts[2].thickness`. */
export interface AppError {
  readonly code: string;
  readonly message: string;
  readonly path?: string;
  readonly hint?: string;
}

export type Result<T> =
  { readonly ok: true; readonly value: T } | { readonly ok: false; readonly errors: readonly [AppError, ...AppError[]] };

export function ok<T>(value: T): Result<T> {
  return { ok: true, value };
}

export function fail<T>(first: AppError, ...others: AppError[]): Result<T> {
  return { ok: false, errors: [first, ...others] };
}

/** One line for a terminal or a log: `parts[2].thickness: ... (hint)`. */
export function describeError(error: AppError): string {
  const where = error.path === undefined ? '' : `${error.path}: `;
  const mend = error.hint === undefined ? '' : ` ${error.hint}`;
  return `${where}${error.message}${mend}`;
}
