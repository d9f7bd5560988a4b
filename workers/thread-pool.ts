// Owns what a run needs of helper threads, and what a helper is told.
// Must not know how threads are started: that differs between browser and Node.

/** A shared memory with a run's image in it, and the kernel built for shared memory. */
export interface ThreadTask {
  readonly kernel: WebAssembly.Module;
  readonly memory: WebAssembly.Memory;
  /** Where the image begins in the memory. */
  readonly base: number;
}

export interface ThreadPool {
  /** Starts so many helper threads, if there are fewer. */
  prepare(helpers: number): void;
  /** Sets up to `helpers` threads to serve the task until the run dismisses them; they join when they are ready. */
  serve(task: ThreadTask, helpers: number): void;
}
