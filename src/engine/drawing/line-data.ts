import { type DecodedWindow, sampleOf } from './decode-window.ts';
import type { PlotSignal } from './types.ts';

/** x in seconds and y in the signal's unit, as uPlot takes them; null is a hole and breaks the line. */
export interface LineData {
  readonly xs: number[];
  readonly ys: (number | null)[];
}

/** Where the four values of a column stand within it: first and last at its ends. */
const PLACES = [0, 1 / 3, 2 / 3, 1] as const;

/**
 * Four points a column in time order keep every one-sample spike; samples stand at their own times. Factor and offset are
 * applied here. A column without any sample is a hole, except where values hold until the next row: there nothing changed.
 */
export function lineData(window: DecodedWindow, signal: PlotSignal, holds: boolean): LineData {
  const values = window.signals.get(signal.index);
  const xs: number[] = [];
  const ys: (number | null)[] = [];
  if (values === undefined) return { xs, ys };
  const { factor, offset } = signal;
  const put = (x: number, value: number) => {
    xs.push(x);
    ys.push(Number.isNaN(value) ? null : value * factor + offset);
  };
  if (window.layout === 'samples') {
    for (let i = 0; i < window.count; i += 1) put(window.times[i]!, values[i]!);
    return { xs, ys };
  }
  const step = (window.to - window.from) / window.count;
  for (let column = 0; column < window.count; column += 1) {
    const at = column * 4;
    const start = window.from + column * step;
    if (Number.isNaN(values[at]!) && Number.isNaN(values[at + 1]!)) {
      if (!holds) put(start, Number.NaN);
      continue;
    }
    for (let place = 0; place < 4; place += 1) put(start + PLACES[place]! * step, values[at + place]!);
  }
  return { xs, ys };
}

export interface Extent {
  readonly lowest: number;
  readonly highest: number;
}

/** Lowest and highest value within [from, to] in the signal's unit; null when there is none. */
export function extentOf(
  window: DecodedWindow,
  signal: PlotSignal,
  from = Number.NEGATIVE_INFINITY,
  to = Number.POSITIVE_INFINITY,
): Extent | null {
  const values = window.signals.get(signal.index);
  if (values === undefined || window.count === 0) return null;
  let lowest = Number.POSITIVE_INFINITY;
  let highest = Number.NEGATIVE_INFINITY;
  const take = (value: number) => {
    if (Number.isNaN(value)) return;
    if (value < lowest) lowest = value;
    if (value > highest) highest = value;
  };
  if (window.layout === 'samples') {
    for (let i = 0; i < window.count; i += 1) {
      if (window.times[i]! >= from && window.times[i]! <= to) take(sampleOf(window, signal.index, i));
    }
  } else {
    const step = (window.to - window.from) / window.count;
    const first = Math.max(0, Math.floor((from - window.from) / step));
    const last = Math.min(window.count - 1, Math.ceil((to - window.from) / step) - 1);
    for (let i = first * 4; i < (last + 1) * 4; i += 1) take(values[i]!);
  }
  if (lowest > highest) return null;
  const a = lowest * signal.factor + signal.offset;
  const b = highest * signal.factor + signal.offset;
  return { lowest: Math.min(a, b), highest: Math.max(a, b) };
}
