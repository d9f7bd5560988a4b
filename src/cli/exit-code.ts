// Owns the meaning of the exit codes.
// Must not know the commands.

export const EXIT = {
  done: 0,
  /** The command line or the job is wrong; nothing was run. */
  refused: 1,
  /** The run broke down, or its results could not be written. */
  failed: 2,
  /** Ended by Ctrl-C: 128 + SIGINT, as shells expect. */
  interrupted: 130,
} as const;

export type ExitCode = (typeof EXIT)[keyof typeof EXIT];
