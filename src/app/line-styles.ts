// Owns how the lines of readings are told apart: a colour and a dash pattern for each run shown.
// Must not know React components, charts, or which readings there are.

export interface LineStyle {
  /** Custom property of the style sheet, e.g. `--c2`. */
  readonly colour: `--c${1 | 2 | 3 | 4 | 5 | 6}`;
  /** Lengths of dash and gap in pixels; empty for a whole line. */
  readonly dash: readonly number[];
}

const STYLES: readonly [LineStyle, ...LineStyle[]] = [
  { colour: '--c1', dash: [] },
  { colour: '--c2', dash: [6, 3] },
  { colour: '--c3', dash: [2, 3] },
  { colour: '--c4', dash: [9, 3, 2, 3] },
  { colour: '--c5', dash: [12, 4] },
  { colour: '--c6', dash: [4, 2, 1, 2, 1, 2] },
];

/** The run shown now is a whole line of the first colour. */
export const CURRENT_LINE: LineStyle = STYLES[0];

/** Kept runs are called `run-1`, `run-2`...: each keeps its line as long as it is kept. */
export function lineStyleOfKept(id: string): LineStyle {
  const number = Number(/^run-(\d+)$/.exec(id)?.[1] ?? '1');
  return STYLES[1 + ((number - 1) % (STYLES.length - 1))] ?? STYLES[0];
}
