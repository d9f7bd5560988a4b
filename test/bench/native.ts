// Owns the native yardstick of the bench: a textbook C version, compiled here and run as a program of its own.
import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

const SOURCE = `
#include <stdio.h>
#include <stdlib.h>
#include <time.h>
static double now(void) { struct timespec t; clock_gettime(CLOCK_MONOTONIC, &t); return t.tv_sec + 1e-9 * t.tv_nsec; }
int main(int argc, char **argv) {
  int n = atoi(argv[1]);
  size_t m = (size_t)n * n;
  float *u = calloc(m, 4), *vx = calloc(m, 4), *vy = calloc(m, 4), *a = malloc(4 * m), *b = malloc(4 * m);
  for (size_t p = 0; p < m; p++) { a[p] = 1; b[p] = 0.7f; }
  u[m / 2 + n / 2] = 1;
  int steps = (int)(4e8 / m) + 4;
  double best = 1e9;
  for (int k = 0; k < 6; k++) {
    double start = now();
    for (int s = 0; s < steps; s++) {
#pragma omp parallel for schedule(static)
      for (int j = 0; j < n - 1; j++) {
        float *restrict x = vx + (size_t)j * n, *restrict y = vy + (size_t)j * n;
        const float *restrict e = u + (size_t)j * n;
        for (int i = 0; i < n - 1; i++) { x[i] -= 0.7f * (e[i + n] - e[i]); y[i] += 0.7f * (e[i + 1] - e[i]); }
      }
#pragma omp parallel for schedule(static)
      for (int j = 1; j < n - 1; j++) {
        float *restrict e = u + (size_t)j * n;
        const float *restrict x = vx + (size_t)j * n, *restrict y = vy + (size_t)j * n, *restrict p = a + (size_t)j * n, *restrict q = b + (size_t)j * n;
        for (int i = 1; i < n - 1; i++) e[i] = p[i] * e[i] + q[i] * ((y[i] - y[i - 1]) - (x[i] - x[i - n]));
      }
    }
    double took = (now() - start) / steps;
    if (took < best) best = took;
  }
  printf("%.1f\\n", m / best / 1e6);
  return u[0] > 1e30f;
}
`;

/** Mcell/s of the C version on so many threads (OpenMP), or null without a compiler. */
export function measureNative(size: number, threads: number): number | null {
  const folder = mkdtempSync(join(tmpdir(), 'guidewall-bench-'));
  try {
    writeFileSync(join(folder, 'textbook.c'), SOURCE);
    try {
      execFileSync('cc', ['-O3', '-march=native', '-fopenmp', '-o', join(folder, 'textbook'), join(folder, 'textbook.c')], {
        stdio: 'pipe',
      });
    } catch {
      return null;
    }
    return Number(
      execFileSync(join(folder, 'textbook'), [String(size)], {
        encoding: 'utf8',
        env: { ...process.env, OMP_NUM_THREADS: String(threads), OMP_PROC_BIND: 'true' },
      }),
    );
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
