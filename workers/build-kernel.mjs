// Owns the compilation of the kernel: AssemblyScript in workers/kernel/assembly to workers/kernel/kernel.wasm.
// Must not know what the kernel computes, nor run it.
import { createHash } from 'node:crypto';
import { readFileSync, renameSync, writeFileSync } from 'node:fs';
import { dirname, join, relative, resolve } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';

const ROOT = dirname(dirname(fileURLToPath(import.meta.url)));
const ENTRY = join(ROOT, 'workers/kernel/assembly/index.ts');
const OUTPUT = join(ROOT, 'workers/kernel/kernel.wasm');
// Raw loads and stores only: no managed objects, so the stub runtime; the host makes the memory, so it is imported.
const FLAGS = ['--runtime', 'stub', '-O3', '--noAssert', '--enable', 'simd', '--importMemory'];
const IMPORT = /\bfrom\s+'(\.[^']+)'/g;

/** Compiles the kernel unless the one on disk was made from the same sources, flags and compiler. Returns its path. */
export async function buildKernel() {
  const stamp = stampOfSources();
  if (stampOnDisk() === stamp) return OUTPUT;
  const { default: asc } = await import('assemblyscript/asc');
  const files = new Map();
  const stderr = asc.createMemoryStream();
  const { error } = await asc.main([relative(ROOT, ENTRY), '--baseDir', ROOT, '--outFile', 'kernel.wasm', ...FLAGS], {
    stderr,
    writeFile: (name, contents) => files.set(name, contents),
  });
  if (error) throw new Error(`The kernel does not compile.\n${stderr.toString()}${error.message}`);
  const unfinished = `${OUTPUT}.${process.pid}`;
  writeFileSync(unfinished, Buffer.concat([files.get('kernel.wasm'), customSection('stamp', stamp)]));
  renameSync(unfinished, OUTPUT); // at once, so that nobody running beside this reads half a kernel
  return OUTPUT;
}

/** Hash of the entry, everything it imports, the flags and the compiler's version. */
function stampOfSources() {
  const compiler = JSON.parse(readFileSync(join(ROOT, 'node_modules/assemblyscript/package.json'), 'utf8')).version;
  const hash = createHash('sha256').update(JSON.stringify([compiler, FLAGS]));
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
function stampOnDisk() {
  let bytes;
  try {
    bytes = readFileSync(OUTPUT);
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
