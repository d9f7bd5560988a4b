// Owns how many threads a run is offered on this machine.
// Must not know how the words of the command line are read, nor what threads do.
import { availableParallelism } from 'node:os';
import { MOST_THREADS } from '../engine/layout.ts';
import type { Threads } from './arguments.ts';

export function threadCount(asked: Threads): number {
  return asked === 'all' ? Math.min(MOST_THREADS, availableParallelism()) : asked;
}
