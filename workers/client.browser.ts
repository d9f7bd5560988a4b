// Owns the page's side of a worker session: every call ends, even when the worker has died.
// Must not know React or stores.
import { wrap, type Remote } from 'comlink';
import type { SessionApi } from './protocol.ts';

export interface SpawnedSession {
  readonly api: SessionApi;
  /** Ends the worker; calls under way and later ones are rejected. */
  close(): void;
}

/** A worker that has not answered by then was blocked, or its program could not be fetched. */
const START_MILLISECONDS = 15_000;

const METHODS = ['prepare', 'open', 'start', 'hold', 'stepOnce', 'rewind', 'stop', 'setPace', 'poll', 'record'] as const;

/** Starts a worker whose runs may take up to `threads` threads. Comlink promises hang for ever when a worker dies, so each call races with its death. */
export function spawnSession(threads: number): SpawnedSession {
  const worker = new Worker(new URL('./session.worker.ts', import.meta.url), { type: 'module' });
  const remote: Remote<SessionApi> = wrap<SessionApi>(worker);
  let die: (reason: Error) => void = () => undefined;
  const death = new Promise<never>((_, reject) => (die = reject));
  death.catch(() => undefined);
  worker.onerror = (event) => {
    worker.terminate();
    die(new Error(`The solver broke: ${event.message || 'its worker could not be started'}.`));
  };
  worker.onmessageerror = () => die(new Error('An answer of the solver could not be read.'));
  const guarded = Object.fromEntries(
    METHODS.map((name) => [
      name,
      (...args: unknown[]) => Promise.race([(remote[name] as unknown as (...a: unknown[]) => Promise<unknown>)(...args), death]),
    ]),
  );
  const api = guarded as unknown as SessionApi;
  const slow = setTimeout(() => {
    worker.terminate();
    die(new Error('The solver did not start within 15 s: its program may be blocked, or could not be fetched. Reload the page.'));
  }, START_MILLISECONDS);
  // What goes wrong is told by the call that needs it.
  void api
    .prepare(threads)
    .catch(() => undefined)
    .finally(() => clearTimeout(slow));
  return {
    api,
    close() {
      worker.terminate();
      die(new Error('The run was closed.'));
    },
  };
}
