// Owns helper threads in the browser: workers of the worker, started when first needed and kept.
// Must not know runs.
import type { ThreadPool } from './thread-pool.ts';

export function makeThreadPool(): ThreadPool {
  const workers: Worker[] = [];
  const prepare = (helpers: number): void => {
    while (workers.length < helpers) workers.push(new Worker(new URL('./helper.worker.ts', import.meta.url), { type: 'module' }));
  };
  return {
    prepare,
    serve(task, helpers) {
      prepare(helpers);
      for (const worker of workers.slice(0, helpers)) worker.postMessage(task);
    },
  };
}
