// Owns the time stepping of a run: rows passed one after the other over the memory image described in src/engine/layout.ts, by
// one thread or several.
// Must not know what a row holds beyond its spans, its wrap and its taps.
import {
  H_BLOCK,
  H_BUFFERS,
  H_CHANNELS,
  H_RECORD,
  H_ROWS,
  H_ROW_TABLE,
  H_STRIDE,
  H_U,
  H_VX,
  H_VY,
  H_WRAP_Y,
  SPAN_KIND,
  SPAN_WORDS,
  SYNC_ENDED,
  SYNC_FIRST_BLOCK,
  SYNC_GO,
  SYNC_LINES,
  SYNC_PROGRESS,
  SYNC_READY,
  SYNC_STEPS,
  SYNC_STOP,
  TAP_CHANNEL,
  TAP_COLUMN,
  TAP_FIELD,
  TAP_WEIGHT,
  TAP_WORDS,
  WORKED,
  WRAP_A,
  WRAP_B,
  WRAP_FIRST,
  WRAP_LAST,
  WRAP_WORDS,
} from '../../../src/engine/layout';
import { word, offset, single } from './words';
import { passSpan, workedSpan } from './spans';
import { stepLines, carryLines } from './lines';
import { SPINS, NAP_MILLISECONDS, LONG_MILLISECONDS, MOST_NAPS, nap, waitFor, tell, start } from './threads';

// u, vx, vy point at column 0 of the row.
function passRow(program: usize, base: usize, u: usize, vx: usize, vy: usize, row: usize, record: usize, step: i32, level: i32): void {
  let at = program + 4;
  for (let n = load<i32>(program); n > 0; n--) {
    const kind = word(at, SPAN_KIND);
    if (kind & WORKED) workedSpan(at, base, u, vx, vy, row, step, level);
    else passSpan(kind, at, base, u, vx, vy, row);
    at += <usize>SPAN_WORDS << 2;
  }
  const firstColumn = <usize>word(at, WRAP_FIRST) << 2;
  if (firstColumn) {
    const lastColumn = <usize>word(at, WRAP_LAST) << 2;
    const link =
      single(at, WRAP_A) * load<f32>(vy + firstColumn) +
      single(at, WRAP_B) * (load<f32>(u + firstColumn) - load<f32>(u + lastColumn));
    store<f32>(vy + firstColumn, link);
    store<f32>(vy + lastColumn + 4, link);
  }
  at += <usize>WRAP_WORDS << 2;
  const taps = load<i32>(at);
  at += 4;
  for (let k = 0; k < taps; k++) {
    const field = word(at, TAP_FIELD);
    const value = load<f32>((field == 0 ? u : field == 1 ? vx : vy) + (<usize>word(at, TAP_COLUMN) << 2));
    const slot = record + (<usize>word(at, TAP_CHANNEL) << 2);
    store<f32>(slot, load<f32>(slot) + single(at, TAP_WEIGHT) * value);
    at += <usize>TAP_WORDS << 2;
  }
}

/**
 * Steps `first` to `first + block` of a slice, by a front that runs down the rows: step k of a block follows step k - 1 one row
 * behind, while its rows are still in cache (Wonnacott 2000). All that touches a row is done in its pass, so the block's size
 * never changes a bit of the answer. `number` counts blocks since the memory was made. With several threads block n follows
 * block n - 1, which another thread works on, just as closely; only the slice's first block has nothing to wait for.
 */
function passBlock(base: usize, first: i32, block: i32, number: i64, thread: i32, threads: i32): void {
  const row = <usize>word(base, H_STRIDE) << 2;
  const rows = word(base, H_ROWS);
  const u = base + offset(base, H_U);
  const vx = base + offset(base, H_VX);
  const vy = base + offset(base, H_VY);
  const table = base + offset(base, H_ROW_TABLE);
  const channels = <usize>word(base, H_CHANNELS) << 2;
  const wrapY = word(base, H_WRAP_Y);
  const record = base + offset(base, H_RECORD);
  const levels = word(base, H_BLOCK) + 1;
  const buffers = word(base, H_BUFFERS);
  const level = <i32>(number % <i64>buffers) * levels;
  const span = <i64>(rows + 2);
  const mine = <usize>SYNC_PROGRESS + (<usize>thread << 6);
  const before = <usize>SYNC_PROGRESS + (<usize>((thread + threads - 1) % threads) << 6);

  if (threads > 1) waitFor(SYNC_LINES, number);
  stepLines(base, first, block, level);
  if (buffers > 1) {
    carryLines(base, level + block, <i32>((number + 1) % <i64>buffers) * levels);
    if (threads > 1) tell(SYNC_LINES, number + 1);
  }
  for (let front = 1; front < rows + block; front++) {
    // A row reads its neighbour above: the block before must be done with that too.
    if (threads > 1 && first > 0) waitFor(before, (number - 1) * span + <i64>min(front + 1, rows));
    for (let k = max(0, front - rows); k < min(block, front); k++) {
      const j = front - k;
      const at = <usize>j * row;
      // The link below the first row is the one above the last: the ghost row carries it (blocks of one step only).
      if (wrapY && j == rows) memory.copy(u + at, u + row, row);
      const step = first + k;
      passRow(base + offset(table, j), base, u + at, vx + at, vy + at, row, record + <usize>step * channels, step, level + k);
      if (wrapY && j == rows) memory.copy(vx + row, vx + at, row);
    }
    if (threads > 1) tell(mine, number * span + <i64>max(0, front - block + 1));
  }
  if (buffers == 1) carryLines(base, level + block, level);
}

function passBlocks(base: usize, steps: i32, firstBlock: i64, thread: i32, threads: i32): void {
  const most = word(base, H_BLOCK);
  for (let first = 0, n = firstBlock; first < steps; first += most, n++) {
    if (n % <i64>threads == <i64>thread) passBlock(base, first, min(most, steps - first), n, thread, threads);
  }
}

/**
 * Advances the image at `base` by `steps` (at most the slice); clears and fills the record, reads source and feed tables.
 * Helpers that serve the same memory take their share of the blocks.
 */
export function advance(base: usize, steps: i32): void {
  memory.fill(base + offset(base, H_RECORD), 0, (<usize>word(base, H_CHANNELS) << 2) * <usize>steps);
  const firstBlock = load<i64>(SYNC_FIRST_BLOCK);
  if (ASC_FEATURE_THREADS) {
    const threads = min(atomic.load<i32>(SYNC_READY) + 1, word(base, H_BUFFERS) - 1);
    if (threads > 1) {
      store<i32>(SYNC_STEPS, steps);
      atomic.store<i32>(SYNC_ENDED, 0);
      start(threads);
      passBlocks(base, steps, firstBlock, 0, threads);
      for (let spins = 0; ; spins++) {
        const ended = atomic.load<i32>(SYNC_ENDED);
        if (ended == threads - 1) break;
        if (spins > SPINS) nap(SYNC_ENDED, ended, NAP_MILLISECONDS);
        if (spins > SPINS + MOST_NAPS) unreachable();
      }
    } else {
      passBlocks(base, steps, firstBlock, 0, 1);
      // A helper may join at the next slice.
      atomic.store<i64>(SYNC_LINES, firstBlock + blocksOf(base, steps));
    }
  } else {
    passBlocks(base, steps, firstBlock, 0, 1);
  }
  store<i64>(SYNC_FIRST_BLOCK, firstBlock + blocksOf(base, steps));
}

function blocksOf(base: usize, steps: i32): i64 {
  const most = word(base, H_BLOCK);
  return <i64>((steps + most - 1) / most);
}

/** Works on slices beside `advance` of another thread until `dismiss`. Needs shared memory. */
export function serve(base: usize): void {
  if (ASC_FEATURE_THREADS) {
    let seen = atomic.load<i32>(SYNC_GO);
    const thread = atomic.add<i32>(SYNC_READY, 1) + 1;
    while (!atomic.load<i32>(SYNC_STOP)) {
      for (let spins = 0; atomic.load<i32>(SYNC_GO) == seen; spins++) {
        if (spins > SPINS) nap(SYNC_GO, seen, LONG_MILLISECONDS);
      }
      seen = atomic.load<i32>(SYNC_GO);
      // Those counted in are waited for, so that the slice's words stand until they have ended.
      if (thread >= (seen & 15)) continue;
      passBlocks(base, load<i32>(SYNC_STEPS), load<i64>(SYNC_FIRST_BLOCK), thread, seen & 15);
      atomic.add<i32>(SYNC_ENDED, 1);
    }
  }
}

/** Sends the helpers home; none may be at work. */
export function dismiss(): void {
  if (ASC_FEATURE_THREADS) {
    atomic.store<i32>(SYNC_STOP, 1);
    start(0);
  }
}

export { energy } from './energy';
export { sampleMagnitudes, samplePairs } from './pictures';
