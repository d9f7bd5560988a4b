// Owns the entry of the Web Worker: a session behind Comlink. No logic.
import { expose } from 'comlink';
import sharedKernelUrl from './kernel/kernel-shared.wasm?url&no-inline';
import kernelUrl from './kernel/kernel.wasm?url&no-inline';
import { makeSession } from './session.ts';
import { makeThreadPool } from './thread-pool.browser.ts';
import { transferReports } from './transfer.ts';
import { makeTurns } from './turns.browser.ts';

const loadKernel = (shared: boolean): Promise<WebAssembly.Module> =>
  WebAssembly.compileStreaming(fetch(shared ? sharedKernelUrl : kernelUrl));
// Only a page that is isolated from other origins may share memory.
const pool = self.crossOriginIsolated ? makeThreadPool() : null;
expose(transferReports(makeSession({ loadKernel, pool, yieldTurn: makeTurns(), now: () => performance.now() })));
