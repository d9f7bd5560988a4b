// Owns a small job to draw on, and carrying out what tools ask for, for the tests of the sheet.
// Must not know the DOM or stores.
import type { Job, ResolvedJob, XY } from '../../../../src/model/job.ts';
import { applyCommand } from '../../../../src/model/commands.ts';
import { makeEmptyJob } from '../../../../src/model/new-job.ts';
import { resolveJob } from '../../../../src/model/resolve-job.ts';
import type { Tool } from '../../../../src/app/view-store.ts';
import { reduceTool, takeTool, type ToolState } from '../../../../src/ui/sheet/tools/reduce-tool.ts';
import type { Modifiers, ToolAction, ToolContext, ToolInput, ToolStep } from '../../../../src/ui/sheet/tools/tool.ts';

/** 200 mm by 100 mm, one wall, one disc, one rectangle, a line current, two probes. */
export function makeTestJob(): Job {
  return {
    ...makeEmptyJob(),
    sheet: {
      width: '200 mm',
      height: '100 mm',
      origin: ['0 mm', '0 mm'],
      background: 'air',
      edges: { left: 'absorbing', right: 'absorbing', bottom: 'metal', top: 'metal' },
    },
    values: { a: '20 mm' },
    parts: [
      {
        id: 'wall-1',
        name: 'Door',
        kind: 'wall',
        material: 'perfect-metal',
        leftOutOfReference: true,
        points: [
          ['60 mm', '0 mm'],
          ['60 mm', '40 mm'],
        ],
        thickness: '4 mm',
      },
      {
        id: 'disc-1',
        name: 'Rod',
        kind: 'disc',
        material: 'ptfe',
        leftOutOfReference: false,
        centre: ['120 mm', '50 mm'],
        radius: 'a/2',
      },
      {
        id: 'rectangle-1',
        name: 'Board',
        kind: 'rectangle',
        material: 'ptfe',
        leftOutOfReference: false,
        from: ['150 mm', '20 mm'],
        to: ['180 mm', '30 mm'],
      },
    ],
    drives: [
      {
        id: 'line-current-1',
        name: 'Wire',
        kind: 'line current',
        at: ['20 mm', '20 mm'],
        amplitude: '1 A',
        waveform: { kind: 'band pulse' },
      },
    ],
    probes: [
      { id: 'probe-1', name: 'Probe 1', at: ['90 mm', '70 mm'] },
      { id: 'probe-2', name: 'Probe 2', at: ['100 mm', '80 mm'] },
    ],
  };
}

export function resolved(job: Job): ResolvedJob {
  const result = resolveJob(job);
  if (!result.ok) throw new Error(result.errors[0].message);
  return result.value;
}

export const PLAIN: Modifiers = { shift: false, alt: false, ctrl: false };

/** Millimetres, for readable tests. */
export function mm(x: number, y: number): XY {
  return [x / 1000, y / 1000];
}

/** A tool in hand, driven as the sheet drives it: commands go through `applyCommand`, selections are kept. */
export class Hand {
  job: Job;
  selection: readonly string[] = [];
  tool: Tool;
  readonly actions: ToolAction[] = [];
  /** 2 px a millimetre: the snapping grid is 5 mm. */
  pixelsPerMetre = 2000;
  paint = 'perfect-metal';
  last: ToolStep<ToolState> | null = null;
  #state: ToolState;
  #gesture = 0;

  constructor(job: Job, tool: Tool = { kind: 'select' }) {
    this.job = job;
    this.tool = tool;
    this.#state = takeTool(tool, [0, 0]);
  }

  context(): ToolContext {
    return {
      job: this.job,
      resolved: resolved(this.job),
      selection: this.selection,
      pixelsPerMetre: this.pixelsPerMetre,
      unit: { name: 'mm', metres: 1e-3 },
      paint: this.paint,
      gesture: `gesture ${this.#gesture}`,
    };
  }

  feed(input: ToolInput): ToolStep<ToolState> {
    if (input.kind === 'press') this.#gesture++;
    const step = reduceTool(this.#state, input, this.context());
    this.#state = step.state;
    this.last = step;
    for (const action of step.commands) this.#carryOut(action);
    return step;
  }

  press(at: XY, modifiers: Partial<Modifiers> = {}): ToolStep<ToolState> {
    return this.feed({ kind: 'press', at, ...PLAIN, ...modifiers });
  }

  move(at: XY, modifiers: Partial<Modifiers> = {}): ToolStep<ToolState> {
    return this.feed({ kind: 'move', at, ...PLAIN, ...modifiers });
  }

  release(at: XY): ToolStep<ToolState> {
    return this.feed({ kind: 'release', at, ...PLAIN });
  }

  click(at: XY, modifiers: Partial<Modifiers> = {}): void {
    this.move(at, modifiers);
    this.press(at, modifiers);
    this.release(at);
  }

  drag(from: XY, to: XY, modifiers: Partial<Modifiers> = {}): void {
    this.press(from);
    this.move([(from[0] + to[0]) / 2, (from[1] + to[1]) / 2], modifiers);
    this.move(to, modifiers);
    this.release(to);
  }

  keys(...keys: readonly string[]): void {
    for (const key of keys) {
      const [last = ''] = key.split('+').slice(-1);
      this.feed({ kind: 'key', key: last, shift: key.startsWith('Shift+'), alt: false, ctrl: key.startsWith('Ctrl+') });
    }
  }

  type(text: string): void {
    for (const key of text) this.feed({ kind: 'key', key, ...PLAIN });
  }

  #carryOut(action: ToolAction): void {
    this.actions.push(action);
    if (action.do === 'select') this.selection = action.ids;
    if (action.do === 'take') {
      this.tool = action.tool;
      this.#state = takeTool(action.tool, [0, 0]);
    }
    if (action.do !== 'edit') return;
    const applied = applyCommand(this.job, action.command);
    if (!applied.ok) throw new Error(applied.errors[0].message);
    this.job = applied.value;
  }
}
