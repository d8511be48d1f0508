import { cssColour } from '../plot/colours.ts';
import type { DecodedWindow } from '../plot/decode-window.ts';
import { extentOf, lineData } from '../plot/line-data.ts';
import type { PlotSignal, PlotWheel, View } from '../plot/types.ts';
import { acrossAt, type Rows, type TurnRow } from './rows-of.ts';
import { shadeOf } from './shade-of.ts';

export interface RowLine {
  readonly signal: PlotSignal;
  readonly role: string;
  readonly dash: readonly number[];
  /** Of all rows, in the signal's unit. */
  readonly low: number;
  readonly high: number;
}

export interface RowDrawing {
  readonly axis: Rows['axis'];
  readonly across: View;
  readonly wheel: PlotWheel | null;
  readonly holds: boolean;
  readonly lines: readonly RowLine[];
}

interface Layer {
  readonly row: TurnRow;
  readonly window: DecodedWindow;
}

/** A canvas in device pixels, empty. Null while it has no size. */
function cleared(canvas: HTMLCanvasElement) {
  const ratio = devicePixelRatio || 1;
  const width = Math.round(canvas.clientWidth * ratio);
  const height = Math.round(canvas.clientHeight * ratio);
  const context = canvas.getContext('2d');
  if (width === 0 || height === 0 || context === null) return null;
  canvas.width = width;
  canvas.height = height;
  return { context, width, height, ratio };
}

/** One row as lines, or several rows on one another: then each is drawn pale, and what they share grows dark. */
export function drawLines(canvas: HTMLCanvasElement, drawing: RowDrawing, layers: readonly Layer[]): void {
  const made = cleared(canvas);
  if (made === null) return;
  const { context, width, height, ratio } = made;
  const { axis, across, wheel, holds, lines } = drawing;
  for (const { signal, role, dash, low, high } of lines) {
    context.strokeStyle = cssColour(role);
    context.globalAlpha = layers.length > 1 ? Math.max(1 / Math.sqrt(layers.length), 0.12) : 1;
    context.lineWidth = Math.min(ratio, 1.25);
    context.setLineDash(dash.map((length) => length * ratio));
    for (const { row, window } of layers) {
      const { xs, ys } = lineData(window, signal, holds);
      context.beginPath();
      let pen = false;
      let before = 0;
      ys.forEach((value, i) => {
        const place = value === null ? null : acrossAt(row, axis, wheel, xs[i]!);
        if (value === null || place === null) {
          pen = false;
          return;
        }
        const x = ((place - across.from) / (across.to - across.from)) * width;
        const y = height * (0.94 - (0.88 * (value - low)) / (high - low || 1));
        if (!pen) context.moveTo(x, y);
        else {
          if (holds) context.lineTo(x, before);
          context.lineTo(x, y);
        }
        before = y;
        pen = true;
      });
      context.stroke();
    }
  }
  context.globalAlpha = 1;
}

/** One signal of a row as shade: pale is low, the full colour is high. */
export function drawShade(canvas: HTMLCanvasElement, drawing: RowDrawing, { row, window }: Layer): void {
  const made = cleared(canvas);
  const line = drawing.lines[0];
  if (made === null || line === undefined) return;
  const { context, width, height } = made;
  const { axis, across, wheel } = drawing;
  const { signal, role, low, high } = line;
  context.fillStyle = cssColour(role);
  const cells = new Map<number, { lowest: number; highest: number }>();
  const { xs, ys } = lineData(window, signal, drawing.holds);
  ys.forEach((value, i) => {
    const place = value === null ? null : acrossAt(row, axis, wheel, xs[i]!);
    if (value === null || place === null) return;
    const x = Math.floor(((place - across.from) / (across.to - across.from)) * width);
    const cell = cells.get(x);
    if (cell === undefined) cells.set(x, { lowest: value, highest: value });
    else {
      cell.lowest = Math.min(cell.lowest, value);
      cell.highest = Math.max(cell.highest, value);
    }
  });
  const places = [...cells.keys()].sort((a, b) => a - b);
  places.forEach((x, i) => {
    const cell = cells.get(x)!;
    const shade = shadeOf(cell.lowest, cell.highest, low, high);
    if (shade === null) return;
    // Where samples are further apart than pixels a cell reaches to the next one, but not over a stretch without any.
    const next = places[i + 1] ?? x + 1;
    context.globalAlpha = shade;
    context.fillRect(x, 0, Math.min(next - x, Math.ceil(width / 40)), height);
  });
  context.globalAlpha = 1;
}

/** Lowest and highest of a signal over all the rows that have come; null before any. */
export function rowsExtent(windows: readonly (DecodedWindow | null)[], signal: PlotSignal) {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (const window of windows) {
    const extent = window === null ? null : extentOf(window, signal);
    if (extent === null) continue;
    low = Math.min(low, extent.lowest);
    high = Math.max(high, extent.highest);
  }
  return low > high ? null : { low, high };
}
