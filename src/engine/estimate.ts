// Owns what is said of a run before it starts: grid, step, memory, time, warnings.
// Must not know the DOM, React, workers.

/** A remark on the job that does not forbid the run, or the reason why it is refused. */
export interface Remark {
  readonly code: string;
  readonly message: string;
  /** Job path or part id it belongs to, when there is one. */
  readonly path?: string;
}

export interface Estimate {
  /** Cells of the sheet itself. */
  readonly cellsX: number;
  readonly cellsY: number;
  /** Cells stepped, absorbers included. */
  readonly cellsTotal: number;
  readonly dxMetres: number;
  readonly dyMetres: number;
  readonly dtSeconds: number;
  readonly stepLimit: number;
  readonly memoryBytes: number;
  /** At the throughput given to `makeEstimate`, to the time limit; decay usually ends the run earlier. */
  readonly secondsAtMost: number;
  /** Shortest wavelength (densest medium, top of the band) over the larger cell size. */
  readonly cellsPerShortestWavelength: number;
  /** Phase error of the Yee lattice along an axis at the top of the band in the densest medium, degrees per wavelength. */
  readonly phaseErrorDegrees: number;
  /** How the plane wave is launched, in words, or null without one. */
  readonly launch: string | null;
  readonly remarks: readonly Remark[];
}
