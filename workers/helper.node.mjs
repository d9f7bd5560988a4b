// Owns the entry of a helper thread in Node: it works on the main thread's run until dismissed. No logic.
// Plain JavaScript, so that it starts the same from sources and beside the built command line.
import { parentPort } from 'node:worker_threads';
import { kernelImports } from './kernel-imports.mjs';

parentPort.on('message', ({ kernel, memory, base }) => {
  new WebAssembly.Instance(kernel, { env: kernelImports(memory) }).exports.serve(base);
});
