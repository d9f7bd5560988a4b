// Owns the shape of a remark on a job.
// Must not know what is remarked on.

/** A remark on the job that does not forbid the run, or the reason why it is refused. */
export interface Remark {
  readonly code: string;
  readonly message: string;
  /** Job path or part id it belongs to, when there is one. */
  readonly path?: string;
}
