// Owns bringing a clone into working order: packages installed, kernel compiled, page and command line built when out of date.
// Must not need any package to be loaded (it runs before there are any), nor know what is built.
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, readdirSync, writeFileSync } from 'node:fs';
import { dirname, join, relative } from 'node:path';
import { fileURLToPath } from 'node:url';

export const ROOT = dirname(dirname(dirname(fileURLToPath(import.meta.url))));
const OLDEST_NODE = [20, 19];
const SOURCES = ['src', 'workers', 'public', 'index.html', 'vite.config.ts', 'package-lock.json'];
const BUILDS = { app: [], cli: ['--mode', 'cli'] };

/** Something outside the program is missing or wrong; its message says what, and the stack would say nothing more. */
export class CloneError extends Error {}

/** Runs `work`; ends the process with exit code 1 when the clone cannot be made ready. */
export async function orExit(work) {
  try {
    return await work();
  } catch (error) {
    console.error(error instanceof CloneError ? error.message : error);
    process.exit(1);
  }
}

export function installPackages() {
  const [major, minor] = process.versions.node.split('.').map(Number);
  if (major < OLDEST_NODE[0] || (major === OLDEST_NODE[0] && minor < OLDEST_NODE[1])) {
    throw new CloneError(`Node ${process.versions.node} is too old: Guidewall needs ${OLDEST_NODE.join('.')} or newer.`);
  }
  if (packagesMatchLock()) return;
  say('Installing packages (the first time only)');
  run('npm', ['ci', '--no-progress', '--loglevel=error'], 'The packages could not be installed.');
}

async function buildKernel() {
  const { buildKernel: build } = await import('../../workers/build-kernel.mjs');
  try {
    return await build();
  } catch (error) {
    throw new CloneError(error.message);
  }
}

/** Builds dist/app or dist/cli unless it was made from the same sources. */
export async function buildIfStale(target) {
  await buildKernel();
  const stampFile = join(ROOT, 'dist', `${target}.stamp`);
  const stamp = stampOfSources();
  if (existsSync(join(ROOT, 'dist', target)) && existsSync(stampFile) && readFileSync(stampFile, 'utf8') === stamp) return;
  say(target === 'app' ? 'Building the page' : 'Building the command line');
  const vite = join(ROOT, 'node_modules/vite/bin/vite.js');
  run(process.execPath, [vite, 'build', '--logLevel', 'warn', ...BUILDS[target]], 'The build failed.');
  mkdirSync(dirname(stampFile), { recursive: true });
  writeFileSync(stampFile, stamp);
}

/** True when every package of the lock file stands in node_modules at its version (optional ones are for other platforms). */
function packagesMatchLock() {
  const installedList = join(ROOT, 'node_modules/.package-lock.json');
  if (!existsSync(installedList)) return false;
  const installed = JSON.parse(readFileSync(installedList, 'utf8')).packages;
  const wanted = JSON.parse(readFileSync(join(ROOT, 'package-lock.json'), 'utf8')).packages;
  return Object.entries(wanted).every(
    ([path, entry]) => path === '' || entry.optional === true || installed[path]?.version === entry.version,
  );
}

function stampOfSources() {
  const hash = createHash('sha256');
  const visit = (path) => {
    const entries = readdirSync(path, { withFileTypes: true }).sort((a, b) => (a.name < b.name ? -1 : 1));
    for (const entry of entries) {
      const inner = join(path, entry.name);
      if (entry.isDirectory()) visit(inner);
      else add(inner);
    }
  };
  const add = (path) => hash.update(relative(ROOT, path)).update('\0').update(readFileSync(path)).update('\0');
  for (const name of SOURCES) {
    const path = join(ROOT, name);
    if (!existsSync(path)) continue;
    if (/\.[a-z]+$/.test(name)) add(path);
    else visit(path);
  }
  return hash.digest('hex');
}

/** Output goes to the error stream, so that what a command prints stays clean. */
function run(command, args, complaint) {
  // npm is a script that only a shell can start on Windows.
  const shell = process.platform === 'win32' && command === 'npm';
  const { status, error } = spawnSync(command, args, { cwd: ROOT, stdio: ['ignore', 2, 2], shell });
  if (status !== 0) throw new CloneError(`${complaint} (${command} ${args.join(' ')}: ${error?.message ?? `exit ${status}`})`);
}

function say(text) {
  console.error(`${text} ...`);
}
