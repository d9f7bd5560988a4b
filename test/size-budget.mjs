// Owns the size budget of the built page: what the browser must fetch before the first paint, each worker, each late chunk.
// Must not know what the chunks hold.
import { readFileSync, readdirSync } from 'node:fs';
import { basename, join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { ROOT } from '../src/cli/clone.mjs';

const APP = join(ROOT, 'dist/app');
// kB (1000 bytes) after gzip. Fonts are left out of the start: text is painted before they arrive.
// Half of the worker is the polygon clipper that exact coverage fractions need; the kernel is there twice, alone and for
// shared memory, and one of them is fetched. All of it comes after the first paint.
const BUDGET = { start: 250, worker: 58, late: 15 };

const page = readFileSync(join(APP, 'index.html'), 'utf8');
const started = [...page.matchAll(/(?:src|href)="\.\/(assets\/[^"]+\.(?:js|css))"/g)].map(([, path]) => path);
const scripts = readdirSync(join(APP, 'assets')).filter((name) => /\.(js|css|wasm)$/.test(name));
const isWorker = (name) => /\.worker-|\.wasm$/.test(name);
const rest = scripts.filter((name) => !started.includes(`assets/${name}`));

const lines = [
  { what: 'start', kilobytes: sum(['index.html', ...started]), limit: BUDGET.start },
  { what: 'workers and kernel', kilobytes: sum(rest.filter(isWorker).map((name) => `assets/${name}`)), limit: BUDGET.worker },
  ...rest
    .filter((name) => !isWorker(name))
    .map((name) => ({ what: basename(name), kilobytes: sum([`assets/${name}`]), limit: BUDGET.late })),
];
for (const { what, kilobytes, limit } of lines) {
  const verdict = kilobytes > limit ? 'TOO LARGE' : 'ok';
  console.log(`${what.padEnd(40)} ${kilobytes.toFixed(1).padStart(7)} kB of ${limit} kB  ${verdict}`);
}
if (lines.some(({ kilobytes, limit }) => kilobytes > limit)) process.exit(1);

function sum(paths) {
  return paths.reduce((total, path) => total + gzipSync(readFileSync(join(APP, path)), { level: 9 }).length / 1000, 0);
}
