// Owns the entry of a helper thread in the browser: it works on another worker's run until dismissed. No logic.
import { kernelImports } from './kernel-imports.mjs';
import type { ThreadTask } from './thread-pool.ts';

self.onmessage = ({ data }: MessageEvent<ThreadTask>) => {
  const { kernel, memory, base } = data;
  const { exports } = new WebAssembly.Instance(kernel, { env: kernelImports(memory) });
  (exports as { serve(base: number): void }).serve(base);
};
