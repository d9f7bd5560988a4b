// Owns helper threads in Node: started when first needed and kept; they do not keep the process alive.
// Must not know runs.
import { Worker } from 'node:worker_threads';
import type { ThreadPool } from './thread-pool.ts';

export function makeThreadPool(): ThreadPool {
  const workers: Worker[] = [];
  const prepare = (helpers: number): void => {
    while (workers.length < helpers) {
      const worker = new Worker(new URL('./helper.node.mjs', import.meta.url));
      worker.unref();
      workers.push(worker);
    }
  };
  return {
    prepare,
    serve(task, helpers) {
      prepare(helpers);
      for (const worker of workers.slice(0, helpers)) worker.postMessage(task);
    },
  };
}
