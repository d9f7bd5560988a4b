// Owns the compilation of the kernel: AssemblyScript in workers/kernel/assembly to kernel.wasm and, for memory that threads
// share, kernel-shared.wasm, both in workers/kernel.
// Must not know what the kernel computes, nor run it.
import { createHash } from 'node:crypto';
import { readFileSync, renameSync, writeFileSync } from 'node:fs';
import { dirname, join, relative, resolve } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';

const ROOT = dirname(dirname(fileURLToPath(import.meta.url)));
const ENTRY = join(ROOT, 'workers/kernel/assembly/index.ts');
const OUTPUT = join(ROOT, 'workers/kernel');
// Raw loads and stores only: no managed objects, so the stub runtime; the host makes the memory, so it is imported.
const FLAGS = ['--runtime', 'stub', '-O3', '--noAssert', '--enable', 'simd', '--importMemory'];
const BUILDS = {
  'kernel.wasm': FLAGS,
  'kernel-shared.wasm': [...FLAGS, '--enable', 'threads', '--sharedMemory', '--maximumMemory', '65536'],
};
const IMPORT = /\bfrom\s+'(\.[^']+)'/g;

/** Compiles each build of the kernel unless the one on disk was made from the same sources, flags and compiler. */
export async function buildKernel() {
  for (const [name, flags] of Object.entries(BUILDS)) {
    const output = join(OUTPUT, name);
    const stamp = stampOfSources(flags);
    if (stampOnDisk(output) !== stamp) await compile(output, flags, stamp);
  }
}

async function compile(output, flags, stamp) {
  const { default: asc } = await import('assemblyscript/asc');
  const files = new Map();
  const stderr = asc.createMemoryStream();
  const { error } = await asc.main([relative(ROOT, ENTRY), '--baseDir', ROOT, '--outFile', 'kernel.wasm', ...flags], {
    stderr,
    writeFile: (name, contents) => files.set(name, contents),
  });
  if (error) throw new Error(`The kernel does not compile.\n${stderr.toString()}${error.message}`);
  const unfinished = `${output}.${process.pid}`;
  writeFileSync(unfinished, Buffer.concat([files.get('kernel.wasm'), customSection('stamp', stamp)]));
  renameSync(unfinished, output); // at once, so that nobody running beside this reads half a kernel
}

/** Hash of the entry, everything it imports, the flags and the compiler's version. */
function stampOfSources(flags) {
  const compiler = JSON.parse(readFileSync(join(ROOT, 'node_modules/assemblyscript/package.json'), 'utf8')).version;
  const hash = createHash('sha256').update(JSON.stringify([compiler, flags]));
  const seen = new Set();
  const visit = (path) => {
    if (seen.has(path)) return;
    seen.add(path);
    const text = readFileSync(path, 'utf8');
    hash.update(relative(ROOT, path)).update(text);
    for (const [, name] of text.matchAll(IMPORT)) visit(resolve(dirname(path), name.endsWith('.ts') ? name : `${name}.ts`));
  };
  visit(ENTRY);
  return hash.digest('hex').slice(0, 16);
}

/** The stamp travels inside the binary, as a custom section that engines skip: a cached kernel cannot lose it. */
function stampOnDisk(output) {
  let bytes;
  try {
    bytes = readFileSync(output);
  } catch {
    return null;
  }
  const section = WebAssembly.validate(bytes)
    ? WebAssembly.Module.customSections(new WebAssembly.Module(bytes), 'stamp')[0]
    : undefined;
  return section === undefined ? null : Buffer.from(section).toString();
}

function customSection(name, text) {
  const content = Buffer.from(text);
  const title = Buffer.from(name);
  // Lengths below 128 are one byte of LEB128.
  return Buffer.concat([Buffer.from([0, 1 + title.length + content.length, title.length]), title, content]);
}

if (process.argv[1] !== undefined && import.meta.url === pathToFileURL(resolve(process.argv[1])).href) {
  try {
    await buildKernel();
  } catch (error) {
    console.error(error.message);
    process.exit(1);
  }
}
