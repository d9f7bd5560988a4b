// Owns laying traces of different times over one axis.
// Must not know plots.

export interface Merged {
  readonly x: number[];
  readonly columns: (number | null)[][];
}

/** Columns over the union of their times; a line runs over the times it lacks. */
export function mergeColumns(made: readonly { readonly x: number[]; readonly y: number[] }[]): Merged {
  if (made.length === 1) return { x: made[0]!.x, columns: [made[0]!.y] };
  const x = [...new Set(made.flatMap((column) => column.x))].sort((a, b) => a - b);
  const columns = made.map((column) => {
    let next = 0;
    return x.map((t, k) => {
      while (next < column.x.length - 1 && column.x[next]! < t) next++;
      const t1 = column.x[next]!;
      if (t1 === t || next === 0 || k === x.length - 1) return column.y[next]!;
      const t0 = column.x[next - 1]!;
      return column.y[next - 1]! + ((column.y[next]! - column.y[next - 1]!) * (t - t0)) / (t1 - t0);
    });
  });
  return { x, columns };
}
