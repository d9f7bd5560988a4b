// Owns finding a Chromium for the browser tests, or installing one.
// Must not know the tests.
import { spawnSync } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import { delimiter, join } from 'node:path';
import { CloneError } from '../../src/cli/clone.mjs';

const COMMANDS = ['chromium', 'chromium-browser', 'google-chrome', 'google-chrome-stable', 'chrome'];
const APPLICATIONS = [
  '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
  '/Applications/Chromium.app/Contents/MacOS/Chromium',
  'C:/Program Files/Google/Chrome/Application/chrome.exe',
];

/** Path of a browser that starts. Asks in the order: CHROMIUM_PATH, system, Playwright's, Debian's packages, the packaged one. */
export async function findChromium() {
  const given = process.env.CHROMIUM_PATH;
  if (given !== undefined && given !== '') {
    if (!starts(given)) throw new CloneError(`CHROMIUM_PATH=${given} does not start. Give the path of a Chromium, or unset it.`);
    return given;
  }
  for (const find of [onSystem, playwrights, fromDebian, packaged, downloaded]) {
    const path = await find();
    if (path !== null && starts(path)) return path;
  }
  throw new CloneError('No Chromium was found, and none could be installed. Install one and give its path in CHROMIUM_PATH.');
}

function onSystem() {
  const onPath = (process.env.PATH ?? '').split(delimiter).flatMap((folder) => COMMANDS.map((command) => join(folder, command)));
  // Some systems keep a placeholder under the browser's name: only one that starts will do.
  return [...onPath, ...APPLICATIONS].find((path) => existsSync(path) && starts(path)) ?? null;
}

async function playwrights() {
  const { chromium } = await import('@playwright/test');
  const path = chromium.executablePath();
  return existsSync(path) ? path : null;
}

function fromDebian() {
  const release = existsSync('/etc/os-release') ? readFileSync('/etc/os-release', 'utf8') : '';
  if (!/^ID=debian$/m.test(release) || process.getuid?.() !== 0) return null;
  console.error("Installing Debian's Chromium ...");
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  for (const args of [['update'], ['install', '-y', '--no-install-recommends', 'chromium']]) {
    if (spawnSync('apt-get', ['-qq', ...args], { stdio: ['ignore', 2, 2], env }).status !== 0) return null;
  }
  return onSystem();
}

/** A Chromium that travels in a registry package: Linux on x64 only. */
async function packaged() {
  if (process.platform !== 'linux' || process.arch !== 'x64') return null;
  const { default: chromium } = await import('@sparticuz/chromium');
  return chromium.executablePath();
}

async function downloaded() {
  console.error("Downloading Playwright's Chromium ...");
  const cli = join(import.meta.dirname, '../../node_modules/@playwright/test/cli.js');
  spawnSync(process.execPath, [cli, 'install', 'chromium'], { stdio: ['ignore', 2, 2] });
  return playwrights();
}

function starts(path) {
  return spawnSync(path, ['--version'], { stdio: 'ignore', timeout: 30_000 }).status === 0;
}
