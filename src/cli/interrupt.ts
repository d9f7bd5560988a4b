// Owns what Ctrl-C does: the first asks for a clean stop, a second ends the process at once.
// Must not know what is stopped.
import { EXIT } from './exit-code.ts';

export interface Interrupt {
  /** True once Ctrl-C, or a termination signal, has come. */
  readonly came: boolean;
  release(): void;
}

const SIGNALS = ['SIGINT', 'SIGTERM'] as const;

export function onInterrupt(): Interrupt {
  let came = false;
  const listener = (): void => {
    if (came) process.exit(EXIT.interrupted);
    came = true;
  };
  for (const signal of SIGNALS) process.on(signal, listener);
  return {
    get came() {
      return came;
    },
    release() {
      for (const signal of SIGNALS) process.off(signal, listener);
    },
  };
}
