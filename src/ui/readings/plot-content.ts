// Owns what a plot shows: lines, columns, floor, marks, cursors.
// Must not know uPlot or React.

export interface PlotLine {
  readonly name: string;
  /** Custom property of the style sheet, e.g. `--c1`. */
  readonly colour: string;
  readonly dash: readonly number[];
  readonly width: number;
}

export interface PlotContent {
  readonly xUnit: string;
  readonly yUnit: string;
  /** Take prefixes for y (traces), or leave the numbers as they are (dB). */
  readonly yPrefixed: boolean;
  readonly logarithmic: boolean;
  readonly lines: readonly PlotLine[];
  readonly x: readonly number[];
  readonly columns: readonly (readonly (number | null)[])[];
  /** Drawn as a zone of the unknown from here down. */
  readonly floor: readonly (number | null)[] | null;
  /** Thin marks on the x axis. */
  readonly marks: readonly number[];
  /** Two cursors, null when not placed. */
  readonly cursors: readonly [number | null, number | null];
  readonly onCursor: (which: 0 | 1, x: number) => void;
  /** Redraw with other colours when this changes. */
  readonly theme: string;
}
