// Owns `npm start`: makes the clone ready, serves the page with the isolation headers and prints its address.
// Must not know what the page does.
import { parseArgs } from 'node:util';
import { ROOT, buildIfStale, installPackages, orExit } from './clone.mjs';

const HELP = `npm start -- [--port N] [--open] [--host]

Installs what is missing, builds what has changed, serves Guidewall and prints its address.

  --port N   port to serve at; the next free one when it is taken (default 4173)
  --open     open the page in the browser
  --host     serve to other machines too (their browsers need HTTPS for shared memory)
  --help     this text`;

const options = readOptions();
if (options.help) {
  console.log(HELP);
} else {
  await orExit(async () => {
    installPackages();
    await buildIfStale('app');
    const { preview } = await import('vite');
    const server = await preview({
      root: ROOT,
      logLevel: 'warn',
      preview: { port: options.port, open: options.open, host: options.host },
    });
    const { local, network } = server.resolvedUrls;
    console.log(`Guidewall is served at ${[...local, ...network].join(' and ')} (Ctrl-C ends it)`);
  });
}

function readOptions() {
  try {
    const { values } = parseArgs({
      options: {
        port: { type: 'string', default: '4173' },
        open: { type: 'boolean', default: false },
        host: { type: 'boolean', default: false },
        help: { type: 'boolean', default: false },
      },
    });
    const port = Number(values.port);
    if (!Number.isInteger(port) || port < 1 || port > 65535) {
      throw new Error(`--port ${values.port}: not a port. Give a whole number from 1 to 65535.`);
    }
    return { ...values, port };
  } catch (error) {
    console.error(`${error.message}\n\n${HELP}`);
    process.exit(1);
  }
}
