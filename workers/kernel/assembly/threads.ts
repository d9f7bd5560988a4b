// Owns how threads wait for each other.
// Must not know what they work on.
import { SYNC_GO } from '../../../src/engine/layout';

export const SPINS = 2000;
export const NAP_MILLISECONDS = 0.05;
// Ten seconds or more of waiting for a thread that works on the same slice: it is gone, and the run with it.
export const MOST_NAPS = 200_000;
export const LONG_MILLISECONDS = 1e9;

// Wait while the int32 at `address` holds `value`, and end such waits: see workers/kernel-imports.mjs.
// @ts-ignore: decorator
@external("env", "nap") export declare function nap(address: usize, value: i32, milliseconds: f64): void;
// @ts-ignore: decorator
@external("env", "wake") declare function wake(address: usize): void;

// Waits until the int64 at `address` is at least `value`: spins, then naps, for its writer may have lost its core.
export function waitFor(address: usize, value: i64): void {
  if (ASC_FEATURE_THREADS) {
    for (let spins = 0; ; spins++) {
      const seen = atomic.load<i64>(address);
      if (seen >= value) return;
      if (spins > SPINS) nap(address, <i32>seen, NAP_MILLISECONDS);
      if (spins > SPINS + MOST_NAPS) unreachable();
    }
  }
}

export function tell(address: usize, value: i64): void {
  if (ASC_FEATURE_THREADS) atomic.store<i64>(address, value);
}

export function start(threads: i32): void {
  if (ASC_FEATURE_THREADS) {
    atomic.store<i32>(SYNC_GO, (((atomic.load<i32>(SYNC_GO) >> 4) + 1) << 4) | threads);
    wake(SYNC_GO);
  }
}
