// Owns a session in this Node process. No logic.
import { readFile } from 'node:fs/promises';
import type { SessionApi } from './protocol.ts';
import { makeSession } from './session.ts';
import { makeThreadPool } from './thread-pool.node.ts';

// Written out one by one: the build leaves them as they stand and puts the files where they point.
const KERNEL = new URL('./kernel/kernel.wasm', import.meta.url);
const SHARED_KERNEL = new URL('./kernel/kernel-shared.wasm', import.meta.url);

export function makeNodeSession(): SessionApi {
  return makeSession({
    loadKernel: async (shared) => WebAssembly.compile(await readFile(shared ? SHARED_KERNEL : KERNEL)),
    pool: makeThreadPool(),
    yieldTurn: (milliseconds) =>
      new Promise((resolve) => (milliseconds > 0 ? setTimeout(resolve, milliseconds) : setImmediate(resolve))),
    now: () => performance.now(),
  });
}
