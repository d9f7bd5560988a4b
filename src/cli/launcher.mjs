#!/usr/bin/env node
// Owns `guidewall` in a clone: builds the command line when it is missing or out of date, then hands over to it.
// Must not know the commands.
import { buildIfStale, installPackages, orExit } from './clone.mjs';

await orExit(async () => {
  installPackages();
  await buildIfStale('cli');
});
await import('../../dist/cli/guidewall.mjs');
