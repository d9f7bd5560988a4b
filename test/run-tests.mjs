// Owns `npm test`: makes the clone ready, runs every test runner, adds up what they counted.
// Must not know what is tested.
import { spawnSync } from 'node:child_process';
import { mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { ROOT, buildIfStale, installPackages, orExit } from '../src/cli/clone.mjs';

const RESULTS = join(ROOT, 'test-results');

const env = await orExit(async () => {
  installPackages();
  await buildIfStale('app');
  await buildIfStale('cli');
  const { findChromium } = await import('./helpers/find-chromium.mjs');
  return { ...process.env, CHROMIUM_PATH: await findChromium() };
});

rmSync(RESULTS, { recursive: true, force: true });
mkdirSync(RESULTS, { recursive: true });
const tallies = [
  runRunner('vitest', ['vitest/vitest.mjs', 'run'], (report) => ({
    passed: report.numPassedTests,
    failed: report.numFailedTests,
  })),
  runRunner('playwright', ['@playwright/test/cli.js', 'test', '--config', 'test/playwright.config.ts'], ({ stats }) => ({
    passed: stats.expected + stats.flaky,
    failed: stats.unexpected,
  })),
];

const passed = tallies.reduce((sum, tally) => sum + tally.passed, 0);
const failed = tallies.reduce((sum, tally) => sum + tally.failed, 0);
const line = `${passed} passed, ${failed} failed`;
writeFileSync(join(RESULTS, 'tally.txt'), `${line}\n`);
console.log(`\n${line}`);
process.exitCode = failed === 0 && passed > 0 ? 0 : 1;

/** A runner that fails without a failed test (a file that does not load, a server that does not start) counts as one failure. */
function runRunner(name, [script, ...args], count) {
  console.log(`\n${name}`);
  const { status } = spawnSync(process.execPath, [join(ROOT, 'node_modules', script), ...args], {
    cwd: ROOT,
    stdio: 'inherit',
    env,
  });
  let tally;
  try {
    tally = count(JSON.parse(readFileSync(join(RESULTS, `${name}.json`), 'utf8')));
  } catch {
    tally = { passed: 0, failed: 0 };
  }
  return status === 0 ? tally : { ...tally, failed: Math.max(tally.failed, 1) };
}
