// Owns one uPlot: made, fed and taken down outside React, with two cursors and wheel zoom.
// Must not know React or what its numbers mean.
import uPlot from 'uplot';
import 'uplot/dist/uPlot.min.css';
import { drawCursors, drawFloor, drawMarks, drawUnit } from './plot-drawing.ts';
import { nearestIndex } from './nearest-index.ts';
import type { PlotContent } from './plot-content.ts';
import { axisUnit, tickWords, unevenTickWords } from './scale-words.ts';

/** What makes another uPlot necessary; all else is fed to the one there is. */
function shapeOf({ lines, logarithmic, xUnit, yUnit, yPrefixed, theme }: PlotContent): string {
  return JSON.stringify([lines, logarithmic, xUnit, yUnit, yPrefixed, theme]);
}

export class PlotController {
  private readonly element: HTMLElement;
  private readonly observer: ResizeObserver;
  private plot: uPlot | null = null;
  private release: () => void = () => undefined;
  private content: PlotContent | null = null;

  constructor(element: HTMLElement) {
    this.element = element;
    this.observer = new ResizeObserver(() => this.plot?.setSize({ width: element.clientWidth, height: element.clientHeight }));
    this.observer.observe(element);
  }

  update(content: PlotContent): void {
    const before = this.content;
    this.content = content;
    const read = (): PlotContent => this.content ?? content;
    if (this.plot === null || before === null || shapeOf(before) !== shapeOf(content)) {
      // Another theme, scale or run beside it: a person who has zoomed in goes on looking at the same piece.
      const sight = before?.xUnit === content.xUnit ? zoomOf(this.plot) : null;
      this.take();
      this.plot = makePlot(this.element, read);
      this.release = listen(this.plot, read);
      if (sight !== null) this.plot.setScale('x', sight);
      return;
    }
    if (before.x !== content.x || before.columns !== content.columns) {
      // A person who has zoomed in keeps what is in sight while more comes in.
      const zoomed = zoomOf(this.plot) !== null;
      this.plot.setData(dataOf(content), !zoomed);
      if (zoomed) this.plot.redraw();
    } else if (before.cursors !== content.cursors || before.marks !== content.marks || before.floor !== content.floor) {
      this.plot.redraw(false);
    }
  }

  destroy(): void {
    this.take();
    this.observer.disconnect();
  }

  private take(): void {
    this.release();
    this.plot?.destroy();
    this.plot = null;
  }
}

type Read = () => PlotContent;

// uPlot declares its scales as an enum that has no values at run time.
// oxlint-disable-next-line typescript/no-unsafe-enum-assignment
const LOGARITHMIC: Pick<uPlot.Scale, 'distr'> = { distr: 3 };

function dataOf({ x, columns }: PlotContent): uPlot.AlignedData {
  return [x as number[], ...(columns as (number | null)[][])];
}

/** The piece of the x axis in sight, or null when all of it is. */
function zoomOf(plot: uPlot | null): { min: number; max: number } | null {
  const x = plot?.data[0] ?? [];
  const { min, max } = plot?.scales['x'] ?? {};
  if (x.length < 2 || min === undefined || min === null || max === undefined || max === null) return null;
  const span = x[x.length - 1]! - x[0]!;
  return min > x[0]! + 1e-6 * span || max < x[x.length - 1]! - 1e-6 * span ? { min, max } : null;
}

const GRAB_PIXELS = 6;

/** The cursor under the pointer, by its number. */
function cursorUnder(plot: uPlot, { cursors }: PlotContent, event: MouseEvent): 0 | 1 | null {
  const at = event.clientX - plot.over.getBoundingClientRect().left;
  const isNear = (which: 0 | 1): boolean => {
    const x = cursors[which];
    return x !== null && x !== undefined && Math.abs(plot.valToPos(x, 'x') - at) <= GRAB_PIXELS;
  };
  return isNear(1) ? 1 : isNear(0) ? 0 : null;
}

function makePlot(element: HTMLElement, read: Read): uPlot {
  const { lines, logarithmic, xUnit, yUnit, yPrefixed } = read();
  const style = getComputedStyle(element);
  const colour = (name: string): string => style.getPropertyValue(name).trim();
  const font = `11px ${style.getPropertyValue('--sans')}`;
  const hair = { stroke: colour('--hair'), width: 1 };
  const axis = { stroke: colour('--soft'), font, grid: hair, ticks: { show: false }, gap: 4 };
  const largestOf = (splits: readonly number[]): number => Math.max(...splits.map(Math.abs));
  const words = (unit: string, prefixed: boolean) => (_: uPlot, splits: number[]) => {
    const scale = prefixed ? axisUnit(largestOf(splits), unit) : { factor: 1, unit };
    const texts = logarithmic ? unevenTickWords(splits, scale.factor) : tickWords(splits, scale.factor);
    // The unit stands once, at the last tick.
    return texts.map((text, k) => (k === texts.length - 1 ? `${text} ${scale.unit}` : text));
  };
  const options: uPlot.Options = {
    width: Math.max(1, element.clientWidth),
    height: Math.max(1, element.clientHeight),
    legend: { show: false },
    padding: [15, 26, 0, 4],
    cursor: {
      drag: { x: true, y: false, dist: 6 },
      points: { show: false },
      y: false,
      // A press on a cursor takes hold of it: no piece is chosen to zoom into.
      bind: { mousedown: (plot, _, handler) => (event) => (cursorUnder(plot, read(), event) === null ? handler(event) : null) },
    },
    scales: {
      x: { time: false, ...(logarithmic ? LOGARITHMIC : {}), range: (_, min, max) => [min, max] },
      y: { range: (_, min, max) => paddedRange(min, max) },
    },
    axes: [
      {
        ...axis,
        size: 26,
        space: 52,
        values: words(xUnit, true),
        ...(logarithmic ? logarithmicAxis : {}),
      },
      {
        ...axis,
        size: yPrefixed ? 62 : 50,
        space: 28,
        values: (_, splits) => tickWords(splits, yPrefixed ? axisUnit(largestOf(splits), yUnit).factor : 1),
      },
    ],
    series: [
      {},
      ...lines.map((line) => ({
        label: line.name,
        stroke: colour(line.colour),
        width: line.width,
        dash: [...line.dash],
        points: { show: false },
        spanGaps: false,
      })),
    ],
    hooks: {
      drawClear: [(plot: uPlot) => drawFloor(plot, read(), colour)],
      draw: [
        (plot: uPlot) => {
          drawUnit(plot, read(), colour('--soft'), font);
          drawMarks(plot, read(), colour('--soft'));
          drawCursors(plot, read(), colour);
        },
      ],
    },
  };
  return new uPlot(options, dataOf(read()), element);
}

function paddedRange(min: number | null, max: number | null): [number, number] {
  if (min === null || max === null) return [-1, 1];
  const span = max - min;
  const pad = span > 0 ? 0.06 * span : Math.max(1e-30, Math.abs(max) * 0.1 || 1);
  return [min - pad, max + pad];
}

/** The splits chosen are the ones wanted: uPlot's own filter would blank most of them. */
const logarithmicAxis: Pick<uPlot.Axis, 'splits' | 'filter'> = {
  splits: (_: uPlot, __: number, min: number, max: number) => logarithmicTicks(min, max),
  filter: (_: uPlot, splits: number[]) => splits,
};

/** 1, 2, 5 of each decade in sight, or linear steps when less than a decade is. */
function logarithmicTicks(min: number, max: number): number[] {
  const ticks: number[] = [];
  for (let decade = 10 ** Math.floor(Math.log10(min)); decade <= max; decade *= 10) {
    for (const digit of max / min > 12 ? [1, 2, 5] : [1, 2, 3, 4, 5, 6, 8]) {
      const tick = digit * decade;
      if (tick >= min * 0.9999 && tick <= max * 1.0001) ticks.push(tick);
    }
  }
  return ticks;
}

/**
 * Click places cursor 1, Shift-click cursor 2, and either can be dragged; wheel zooms at the pointer, double click (uPlot's
 * own) shows all.
 */
function listen(plot: uPlot, read: Read): () => void {
  let downAt = 0;
  let held: 0 | 1 | null = null;
  const place = (event: MouseEvent, which: 0 | 1): void => {
    const { x, onCursor } = read();
    if (x.length === 0) return;
    const value = plot.posToVal(event.clientX - plot.over.getBoundingClientRect().left, 'x');
    onCursor(which, x[nearestIndex(x, value)]!);
  };
  const down = (event: MouseEvent): void => {
    downAt = event.clientX;
    held = event.button === 0 ? cursorUnder(plot, read(), event) : null;
  };
  const move = (event: MouseEvent): void => {
    if (held !== null) place(event, held);
    else if (event.target === plot.over) plot.over.style.cursor = cursorUnder(plot, read(), event) === null ? '' : 'ew-resize';
  };
  const up = (event: MouseEvent): void => {
    const clicked = held === null && event.target === plot.over && event.button === 0 && Math.abs(event.clientX - downAt) < 5;
    held = null;
    if (clicked) place(event, event.shiftKey ? 1 : 0);
  };
  const wheel = (event: WheelEvent): void => {
    event.preventDefault();
    const { x } = read();
    const { min, max } = plot.scales['x'] ?? {};
    if (x.length < 2 || min === undefined || min === null || max === undefined || max === null) return;
    const at = plot.posToVal(event.clientX - plot.over.getBoundingClientRect().left, 'x');
    const factor = Math.exp(event.deltaY * 0.0015);
    const from = Math.max(x[0]!, at - (at - min) * factor);
    const to = Math.min(x[x.length - 1]!, at + (max - at) * factor);
    if (to > from) plot.setScale('x', { min: from, max: to });
  };
  plot.over.addEventListener('mousedown', down);
  window.addEventListener('mousemove', move);
  window.addEventListener('mouseup', up);
  plot.over.addEventListener('wheel', wheel, { passive: false });
  return () => {
    plot.over.removeEventListener('mousedown', down);
    window.removeEventListener('mousemove', move);
    window.removeEventListener('mouseup', up);
    plot.over.removeEventListener('wheel', wheel);
  };
}
