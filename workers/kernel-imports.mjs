// Owns what the kernel imports: its memory, and waiting on a word of it.
// Plain JavaScript, for helper threads in Node run it as it stands.
// Waiting is done out here because the baseline compiler of V8 11.3 (Node 20) loses a function's locals across
// memory.atomic.wait32 and memory.atomic.notify.

/** `nap` waits up to so many milliseconds while the word at `address` holds `value`; `wake` ends the naps on it. */
export function kernelImports(memory) {
  const words = new Int32Array(memory.buffer);
  return {
    memory,
    nap: (address, value, milliseconds) => void Atomics.wait(words, address >> 2, value, milliseconds),
    wake: (address) => void Atomics.notify(words, address >> 2),
  };
}
