// Owns the one run controller of the page, set in its surroundings: workers, animation frames, cores.
// Must not know how a run is followed.
import { spawnSession } from '../../workers/client.browser.ts';
import { MOST_THREADS } from '../engine/layout.ts';
import { keepRun, overlayKept, removeKept, renameKept } from './run-book.ts';
import { RunController } from './run-controller.ts';
import type { RunActions } from './run-store.ts';

/** On a machine of many cores one is left to the page. */
export function threadsOfMachine(): number {
  const cores = navigator.hardwareConcurrency;
  return Math.min(MOST_THREADS, cores > 2 ? cores - 1 : cores);
}

const HIDDEN_MILLISECONDS = 250;

/** Hidden pages get no animation frames, yet their runs end too. */
function nextFrame(): Promise<void> {
  return new Promise((resolve) => {
    const frame = requestAnimationFrame(go);
    const timer = setTimeout(go, HIDDEN_MILLISECONDS);
    function go(): void {
      cancelAnimationFrame(frame);
      clearTimeout(timer);
      resolve();
    }
  });
}

export const runController = new RunController({
  spawn: spawnSession,
  nextFrame,
  wait: (milliseconds) => new Promise((resolve) => setTimeout(resolve, milliseconds)),
  now: () => performance.now(),
  threads: threadsOfMachine,
});

/** Free of `this`: each may be handed on by itself. */
export const runActions: RunActions = {
  run: () => runController.run(),
  hold: () => runController.hold(),
  resume: () => runController.resume(),
  stepOnce: () => runController.stepOnce(),
  backToStart: () => runController.backToStart(),
  stop: () => runController.stop(),
  setPace: (stepsPerSecond) => runController.setPace(stepsPerSecond),
  keep: keepRun,
  renameKept,
  overlayKept,
  removeKept,
  reopenKept: (id) => runController.reopenKept(id),
};
