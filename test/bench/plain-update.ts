// Owns the baseline of the bench: the textbook update in plain TypeScript, separate sweeps, coefficients a cell.
// It has metal edges and no absorber, drive or probe, so it does less than the run it is compared with.

export interface PlainSheet {
  readonly n: number;
  readonly u: Float32Array;
  readonly vx: Float32Array;
  readonly vy: Float32Array;
  readonly a: Float32Array;
  readonly b: Float32Array;
  readonly bv: number;
}

export function makePlainSheet(n: number): PlainSheet {
  const sheet = {
    n,
    u: new Float32Array(n * n),
    vx: new Float32Array(n * n),
    vy: new Float32Array(n * n),
    a: new Float32Array(n * n).fill(1),
    b: new Float32Array(n * n).fill(0.7),
    bv: 0.7,
  };
  sheet.u[(n >> 1) * n + (n >> 1)] = 1;
  return sheet;
}

export function stepPlainSheet({ n, u, vx, vy, a, b, bv }: PlainSheet): void {
  for (let j = 0; j < n - 1; j++) {
    for (let i = 0; i < n - 1; i++) {
      const p = j * n + i;
      const here = u[p]!;
      vx[p] = vx[p]! - bv * (u[p + n]! - here);
      vy[p] = vy[p]! + bv * (u[p + 1]! - here);
    }
  }
  for (let j = 1; j < n - 1; j++) {
    for (let i = 1; i < n - 1; i++) {
      const p = j * n + i;
      u[p] = a[p]! * u[p]! + b[p]! * (vy[p]! - vy[p - 1]! - (vx[p]! - vx[p - n]!));
    }
  }
}
