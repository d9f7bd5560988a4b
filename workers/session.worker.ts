// Owns the entry of the Web Worker: a session behind Comlink. No logic.
import { expose } from 'comlink';
import kernelUrl from './kernel/kernel.wasm?url&no-inline';
import { makeSession } from './session.ts';
import { transferReports } from './transfer.ts';
import { makeTurns } from './turns.browser.ts';

const loadKernel = (): Promise<WebAssembly.Module> => WebAssembly.compileStreaming(fetch(kernelUrl));
expose(transferReports(makeSession({ loadKernel, yieldTurn: makeTurns(), now: () => performance.now() })));
