// Owns a session in this Node process. No logic.
import { readFile } from 'node:fs/promises';
import type { SessionApi } from './protocol.ts';
import { makeSession } from './session.ts';

/** `kernelUrl` is where the compiled kernel lies; the default serves a clone. */
export async function makeNodeSession(kernelUrl = new URL('./kernel/kernel.wasm', import.meta.url)): Promise<SessionApi> {
  const kernel = await WebAssembly.compile(await readFile(kernelUrl));
  return makeSession({
    loadKernel: () => Promise.resolve(kernel),
    yieldTurn: (milliseconds) =>
      new Promise((resolve) => (milliseconds > 0 ? setTimeout(resolve, milliseconds) : setImmediate(resolve))),
    now: () => performance.now(),
  });
}
