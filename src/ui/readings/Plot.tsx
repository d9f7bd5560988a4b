// Owns one plot on the page: uPlot made, fed and taken down outside React, with two cursors, wheel zoom and keys.
// Must not know what its numbers mean.
import { useEffect, useRef } from 'react';
import uPlot from 'uplot';
import 'uplot/dist/uPlot.min.css';
import { axisUnit, tickWords } from './scale-words.ts';

export interface PlotLine {
  readonly name: string;
  /** Custom property of the style sheet, e.g. `--c1`. */
  readonly colour: string;
  readonly dash: readonly number[];
  readonly width: number;
}

export interface PlotProps {
  /** What is shown, for those who cannot see it. */
  readonly label: string;
  readonly xUnit: string;
  readonly yUnit: string;
  /** Take prefixes for y (traces), or leave the numbers as they are (dB). */
  readonly yPrefixed: boolean;
  readonly logarithmic: boolean;
  readonly lines: readonly PlotLine[];
  readonly x: readonly number[];
  readonly columns: readonly (readonly (number | null)[])[];
  /** Drawn as a zone of the unknown from here down. */
  readonly floor: readonly (number | null)[] | null;
  /** Thin marks on the x axis. */
  readonly marks: readonly number[];
  /** Two cursors, null when not placed. */
  readonly cursors: readonly [number | null, number | null];
  readonly onCursor: (which: 0 | 1, x: number) => void;
  /** Redraw with other colours when this changes. */
  readonly theme: string;
}

export function Plot(props: PlotProps) {
  const host = useRef<HTMLDivElement>(null);
  const latest = useRef(props);
  latest.current = props;
  const plot = useRef<uPlot | null>(null);
  const shape = JSON.stringify([props.lines, props.logarithmic, props.xUnit, props.yUnit, props.yPrefixed, props.theme]);

  useEffect(() => {
    const element = host.current;
    if (element === null) return;
    const made = makePlot(element, latest);
    plot.current = made;
    const observer = new ResizeObserver(() => made.setSize({ width: element.clientWidth, height: element.clientHeight }));
    observer.observe(element);
    const release = listen(element, made, latest);
    return () => {
      release();
      observer.disconnect();
      made.destroy();
      plot.current = null;
    };
  }, [shape]);

  useEffect(() => {
    const made = plot.current;
    if (made === null) return;
    const zoomed = isZoomed(made);
    made.setData(dataOf(props), !zoomed);
    if (zoomed) made.redraw();
  }, [props.x, props.columns, shape]);

  useEffect(() => {
    plot.current?.redraw(false);
  }, [props.cursors, props.marks, props.floor]);

  return (
    <div
      className="plot"
      ref={host}
      // A plot takes the arrow keys for its cursors, so it must be reachable.
      tabIndex={0}
      role="group"
      aria-label={`${props.label}. Arrow keys move the first cursor, with Shift the second.`}
    />
  );
}

type Latest = { readonly current: PlotProps };

function dataOf({ x, columns }: PlotProps): uPlot.AlignedData {
  return [x as number[], ...(columns as (number | null)[][])];
}

function isZoomed(plot: uPlot): boolean {
  const x = plot.data[0];
  const { min, max } = plot.scales['x'] ?? {};
  if (x.length < 2 || min == null || max == null) return false;
  const span = x[x.length - 1]! - x[0]!;
  return min > x[0]! + 1e-6 * span || max < x[x.length - 1]! - 1e-6 * span;
}

function makePlot(element: HTMLElement, latest: Latest): uPlot {
  const { lines, logarithmic, xUnit, yUnit, yPrefixed } = latest.current;
  const style = getComputedStyle(element);
  const colour = (name: string): string => style.getPropertyValue(name).trim();
  const font = `11px ${style.getPropertyValue('--sans')}`;
  const hair = { stroke: colour('--hair'), width: 1 };
  const axis = { stroke: colour('--soft'), font, grid: hair, ticks: { show: false }, gap: 4 };
  const largestOf = (splits: readonly number[]): number => Math.max(...splits.map(Math.abs));
  const words = (unit: string, prefixed: boolean) => (_: uPlot, splits: number[]) => {
    const scale = prefixed ? axisUnit(largestOf(splits.filter((value) => value !== null)), unit) : { factor: 1, unit };
    const texts = tickWords(splits, scale.factor);
    // The unit stands once, at the last tick.
    return texts.map((text, k) => (k === texts.length - 1 ? `${text} ${scale.unit}` : text));
  };
  const options: uPlot.Options = {
    width: Math.max(1, element.clientWidth),
    height: Math.max(1, element.clientHeight),
    legend: { show: false },
    padding: [10, 26, 0, 4],
    cursor: { drag: { x: true, y: false, dist: 6 }, points: { show: false }, y: false },
    scales: {
      x: { time: false, distr: logarithmic ? 3 : 1, range: (_, min, max) => [min, max] },
      y: { range: (_, min, max) => paddedRange(min, max) },
    },
    axes: [
      {
        ...axis,
        size: 26,
        space: 52,
        values: words(xUnit, true),
        ...(logarithmic ? { splits: (_: uPlot, __: number, min: number, max: number) => logarithmicTicks(min, max) } : {}),
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
      drawClear: [(plot: uPlot) => drawFloor(plot, latest.current, colour)],
      draw: [
        (plot: uPlot) => {
          drawUnit(plot, latest.current, colour('--soft'), font);
          drawMarks(plot, latest.current, colour('--soft'));
          drawCursors(plot, latest.current, colour);
        },
      ],
    },
  };
  return new uPlot(options, dataOf(latest.current), element);
}

function paddedRange(min: number | null, max: number | null): [number, number] {
  if (min === null || max === null) return [-1, 1];
  const span = max - min;
  const pad = span > 0 ? 0.06 * span : Math.max(1e-30, Math.abs(max) * 0.1 || 1);
  return [min - pad, max + pad];
}

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

/** The zone under the floor is hatched: what lies there is not known. */
function drawFloor(plot: uPlot, { floor, x }: PlotProps, colour: (name: string) => string): void {
  if (floor === null) return;
  const { ctx, bbox } = plot;
  const bottom = bbox.top + bbox.height;
  ctx.save();
  ctx.beginPath();
  let begun = false;
  let last = 0;
  for (let k = 0; k < x.length; k++) {
    const level = floor[k];
    if (level == null) continue;
    const px = plot.valToPos(x[k]!, 'x', true);
    const py = Math.min(bottom, plot.valToPos(level, 'y', true));
    if (begun) ctx.lineTo(px, py);
    else ctx.moveTo(px, bottom);
    if (!begun) ctx.lineTo(px, py);
    begun = true;
    last = px;
  }
  if (begun) {
    ctx.lineTo(last, bottom);
    ctx.closePath();
    ctx.clip();
    ctx.beginPath();
    ctx.rect(bbox.left, bbox.top, bbox.width, bbox.height);
    ctx.clip();
    ctx.strokeStyle = colour('--line');
    ctx.lineWidth = devicePixelRatio;
    ctx.beginPath();
    for (let s = bbox.left - bbox.height; s < bbox.left + bbox.width; s += 6 * devicePixelRatio) {
      ctx.moveTo(s, bottom);
      ctx.lineTo(s + bbox.height, bbox.top);
    }
    ctx.stroke();
  }
  ctx.restore();
}

function drawUnit(plot: uPlot, { yUnit, yPrefixed }: PlotProps, colour: string, font: string): void {
  const { ctx, bbox } = plot;
  const { min = 0, max = 0 } = plot.scales['y'] ?? {};
  const unit = yPrefixed ? axisUnit(Math.max(Math.abs(min ?? 0), Math.abs(max ?? 0)), yUnit).unit : yUnit;
  ctx.save();
  ctx.fillStyle = colour;
  ctx.font = font.replace('11px', `${11 * devicePixelRatio}px`);
  ctx.textBaseline = 'top';
  ctx.textAlign = 'left';
  ctx.fillText(unit, bbox.left + 5 * devicePixelRatio, bbox.top + 2 * devicePixelRatio);
  ctx.restore();
}

function drawMarks(plot: uPlot, { marks }: PlotProps, colour: string): void {
  const { ctx, bbox } = plot;
  ctx.save();
  ctx.fillStyle = colour;
  for (const mark of marks) {
    const px = plot.valToPos(mark, 'x', true);
    if (px < bbox.left || px > bbox.left + bbox.width) continue;
    const s = 3.5 * devicePixelRatio;
    ctx.beginPath();
    ctx.moveTo(px, bbox.top + bbox.height - 2 * s);
    ctx.lineTo(px - s, bbox.top + bbox.height);
    ctx.lineTo(px + s, bbox.top + bbox.height);
    ctx.fill();
  }
  ctx.restore();
}

/** Cursor 1 is a whole line, cursor 2 a dashed one; dots where they meet the lines. */
function drawCursors(plot: uPlot, { cursors, columns, lines, x }: PlotProps, colour: (name: string) => string): void {
  const { ctx, bbox } = plot;
  cursors.forEach((cursor, which) => {
    if (cursor === null || x.length === 0) return;
    const px = plot.valToPos(cursor, 'x', true);
    if (px < bbox.left - 1 || px > bbox.left + bbox.width + 1) return;
    ctx.save();
    ctx.strokeStyle = colour('--ink');
    ctx.lineWidth = devicePixelRatio;
    ctx.setLineDash(which === 0 ? [] : [4 * devicePixelRatio, 3 * devicePixelRatio]);
    ctx.beginPath();
    ctx.moveTo(px, bbox.top);
    ctx.lineTo(px, bbox.top + bbox.height);
    ctx.stroke();
    const k = nearestIndex(x, cursor);
    columns.forEach((column, n) => {
      const value = column[k];
      const line = lines[n];
      if (value == null || line === undefined) return;
      ctx.fillStyle = colour(line.colour);
      ctx.beginPath();
      ctx.arc(px, plot.valToPos(value, 'y', true), 3.5 * devicePixelRatio, 0, 2 * Math.PI);
      ctx.fill();
    });
    ctx.restore();
  });
}

export function nearestIndex(x: readonly number[], value: number): number {
  let low = 0;
  let high = x.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (x[middle]! <= value) low = middle;
    else high = middle;
  }
  return value - (x[low] ?? 0) <= (x[high] ?? 0) - value ? low : high;
}

/** Click places cursor 1, Shift-click cursor 2; wheel zooms at the pointer, double click (uPlot's own) shows all. */
function listen(element: HTMLElement, plot: uPlot, latest: Latest): () => void {
  let downAt = 0;
  const place = (event: MouseEvent): void => {
    const { x, onCursor } = latest.current;
    if (x.length === 0) return;
    const value = plot.posToVal(event.clientX - plot.over.getBoundingClientRect().left, 'x');
    onCursor(event.shiftKey ? 1 : 0, x[nearestIndex(x, value)]!);
  };
  const down = (event: MouseEvent): void => {
    downAt = event.clientX;
  };
  const up = (event: MouseEvent): void => {
    if (event.button === 0 && Math.abs(event.clientX - downAt) < 5) place(event);
  };
  const wheel = (event: WheelEvent): void => {
    event.preventDefault();
    const { x } = latest.current;
    const { min, max } = plot.scales['x'] ?? {};
    if (x.length < 2 || min == null || max == null) return;
    const at = plot.posToVal(event.clientX - plot.over.getBoundingClientRect().left, 'x');
    const factor = Math.exp(event.deltaY * 0.0015);
    const from = Math.max(x[0]!, at - (at - min) * factor);
    const to = Math.min(x[x.length - 1]!, at + (max - at) * factor);
    if (to > from) plot.setScale('x', { min: from, max: to });
  };
  const key = (event: KeyboardEvent): void => {
    const step = event.key === 'ArrowLeft' ? -1 : event.key === 'ArrowRight' ? 1 : 0;
    const { x, cursors, onCursor } = latest.current;
    if (step === 0 || x.length === 0) return;
    event.preventDefault();
    const which = event.shiftKey ? 1 : 0;
    const stride = Math.max(1, Math.round(x.length / 200));
    const now = cursors[which] === null ? (x.length >> 1) - step : nearestIndex(x, cursors[which]);
    onCursor(which, x[Math.max(0, Math.min(x.length - 1, now + step * stride))]!);
  };
  plot.over.addEventListener('mousedown', down);
  plot.over.addEventListener('mouseup', up);
  plot.over.addEventListener('wheel', wheel, { passive: false });
  element.addEventListener('keydown', key);
  return () => {
    plot.over.removeEventListener('mousedown', down);
    plot.over.removeEventListener('mouseup', up);
    plot.over.removeEventListener('wheel', wheel);
    element.removeEventListener('keydown', key);
  };
}
