#!/usr/bin/env node
// Owns the entry of the command line: the words in, the exit code out.
// Must not know what a command does.
import { parseCommandLine } from './arguments.ts';
import type { Invocation } from './arguments.ts';
import { checkCommand } from './check-command.ts';
import { EXIT } from './exit-code.ts';
import type { ExitCode } from './exit-code.ts';
import { runCommand } from './run-command.ts';
import { speedCommand } from './speed-command.ts';
import { VERSION } from './version.ts';

// A reader that closes early (`guidewall check job.json | head -1`) is no failure.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code === 'EPIPE') process.exit(EXIT.done);
  throw error;
});

process.exitCode = await carryOut(parseCommandLine(process.argv.slice(2)));

async function carryOut(invocation: Invocation): Promise<ExitCode> {
  switch (invocation.command) {
    case 'run':
      return runCommand(invocation);
    case 'check':
      return checkCommand(invocation);
    case 'speed':
      return speedCommand(invocation);
    case 'help':
      console.log(invocation.text);
      return EXIT.done;
    case 'version':
      console.log(VERSION);
      return EXIT.done;
    case 'misused':
      console.error(invocation.message);
      return EXIT.refused;
  }
}
