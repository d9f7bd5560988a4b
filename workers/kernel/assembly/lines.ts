// Owns the incident lines: plane waves stepped on the grid beside the rows, a level ahead.
// Must not know where they enter.
import {
  H_LINES,
  H_LINE_TABLE,
  LINE_A,
  LINE_B,
  LINE_BU,
  LINE_BVX,
  LINE_BVY,
  LINE_FED,
  LINE_FEED,
  LINE_LENGTH,
  LINE_LEVEL,
  LINE_MX,
  LINE_MY,
  LINE_U,
  LINE_VX,
  LINE_VY,
  LINE_WORDS,
} from '../../../src/engine/layout';
import { word, offset } from './words';
import { start } from './threads';

// Level `level` + 1 of a line from level `level`.
function stepLine(line: usize, base: usize, step: i32, level: i32): void {
  const length = word(line, LINE_LENGTH);
  const mx = word(line, LINE_MX);
  const my = word(line, LINE_MY);
  const fed = word(line, LINE_FED);
  const next = offset(line, LINE_LEVEL);
  const from = base + next * <usize>level;
  const u = from + offset(line, LINE_U);
  const vx = from + offset(line, LINE_VX);
  const vy = from + offset(line, LINE_VY);
  const u1 = u + next;
  const a = base + offset(line, LINE_A);
  const b = base + offset(line, LINE_B);
  const feed = base + offset(line, LINE_FEED) + (<usize>(step * fed) << 3);
  const bu = load<f64>(line + (<usize>LINE_BU << 2));
  const bvx = load<f64>(line + (<usize>LINE_BVX << 2));
  const bvy = load<f64>(line + (<usize>LINE_BVY << 2));
  for (let r = 0; r < fed; r++) store<f64>(u1 + (<usize>r << 3), load<f64>(feed + (<usize>r << 3)));
  for (let r = fed; r < length - fed; r++) {
    const p = <usize>r << 3;
    const curl =
      load<f64>(vy + (<usize>(r + mx) << 3)) - load<f64>(vy + p) - (load<f64>(vx + (<usize>(r + my) << 3)) - load<f64>(vx + p));
    store<f64>(u1 + p, load<f64>(a + 2 * p) * load<f64>(u + p) + load<f64>(b + 2 * p) * bu * curl);
  }
  for (let r = max(0, my); r < length + min(0, my); r++) {
    const p = <usize>r << 3;
    const h = <usize>(2 * r - my) << 3;
    const rise = load<f64>(u1 + p) - load<f64>(u1 + (<usize>(r - my) << 3));
    store<f64>(vx + next + p, load<f64>(a + h) * load<f64>(vx + p) - load<f64>(b + h) * bvx * rise);
  }
  for (let r = max(0, mx); r < length + min(0, mx); r++) {
    const p = <usize>r << 3;
    const h = <usize>(2 * r - mx) << 3;
    const rise = load<f64>(u1 + p) - load<f64>(u1 + (<usize>(r - mx) << 3));
    store<f64>(vy + next + p, load<f64>(a + h) * load<f64>(vy + p) + load<f64>(b + h) * bvy * rise);
  }
}

export function stepLines(base: usize, first: i32, block: i32, level: i32): void {
  const table = base + offset(base, H_LINE_TABLE);
  for (let n = 0; n < word(base, H_LINES); n++) {
    for (let k = 0; k < block; k++) stepLine(table + <usize>n * (<usize>LINE_WORDS << 2), base, first + k, level + k);
  }
}

// The last level of one block is the first of the next.
export function carryLines(base: usize, from: i32, to: i32): void {
  const table = base + offset(base, H_LINE_TABLE);
  for (let n = 0; n < word(base, H_LINES); n++) {
    const line = table + <usize>n * (<usize>LINE_WORDS << 2);
    const bytes = offset(line, LINE_LEVEL);
    const start = base + offset(line, LINE_U);
    memory.copy(start + bytes * <usize>to, start + bytes * <usize>from, bytes);
  }
}
