// Owns one place for a solver: started when first needed, replaced when it has died.
// Must not know jobs, stores, or what is asked of the solver.
import type { SessionApi } from '../../workers/protocol.ts';

export interface SpawnedSolver {
  readonly api: SessionApi;
  close(): void;
}

export class SolverSeat {
  private readonly spawn: () => SpawnedSolver;
  private seated: SpawnedSolver | null = null;

  constructor(spawn: () => SpawnedSolver) {
    this.spawn = spawn;
  }

  get api(): SessionApi {
    this.seated ??= this.spawn();
    return this.seated.api;
  }

  /** The next use starts a new solver; whatever the old one was doing is given up. */
  clear(): void {
    this.seated?.close();
    this.seated = null;
  }
}
