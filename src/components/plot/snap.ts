import type { SamplesWindow } from './decode-window.ts';
import type { PlotWheel } from './types.ts';

/** What a handle of the span can be put on. */
export type SnapTo = 'edge' | 'peak' | 'tooth';

/** Half-way between lowest and highest of the samples at hand; null where nothing changes. */
function middleOf(values: Float32Array): number | null {
  let lowest = Number.POSITIVE_INFINITY;
  let highest = Number.NEGATIVE_INFINITY;
  for (const value of values) {
    if (value < lowest) lowest = value;
    if (value > highest) highest = value;
  }
  return highest > lowest ? (lowest + highest) / 2 : null;
}

/** Where the trace passes half-way between its lowest and highest here, rising or falling; straight between two samples. */
function crossings({ times, count, holds }: SamplesWindow, values: Float32Array, level: number): number[] {
  const found: number[] = [];
  for (let i = 1; i < count; i += 1) {
    const before = values[i - 1]!;
    const here = values[i]!;
    if (before < level === here < level || Number.isNaN(before) || Number.isNaN(here)) continue;
    const share = holds ? 1 : (level - before) / (here - before);
    found.push(times[i - 1]! + share * (times[i]! - times[i - 1]!));
  }
  return found;
}

const nearest = (times: readonly number[], at: number): number | null =>
  times.length === 0 ? null : times.reduce((a, b) => (Math.abs(b - at) < Math.abs(a - at) ? b : a));

/** The nearest edge of one signal's samples; null where there is none. */
export function nearestEdge(window: SamplesWindow, signal: number, at: number): number | null {
  const values = window.signals.get(signal);
  const level = values === undefined ? null : middleOf(values);
  return values === undefined || level === null ? null : nearest(crossings(window, values, level), at);
}

/** The sample farthest from half-way in the swing that holds `at` (from one crossing to the next); null without a change. */
export function nearestPeak(window: SamplesWindow, signal: number, at: number): number | null {
  const values = window.signals.get(signal);
  const level = values === undefined ? null : middleOf(values);
  if (values === undefined || level === null) return null;
  const edges = crossings(window, values, level);
  const from = edges.filter((edge) => edge <= at).at(-1) ?? Number.NEGATIVE_INFINITY;
  const to = edges.find((edge) => edge > at) ?? Number.POSITIVE_INFINITY;
  let best: number | null = null;
  let farthest = -1;
  for (let i = 0; i < window.count; i += 1) {
    const time = window.times[i]!;
    const away = Math.abs(values[i]! - level);
    if (time < from || time > to || !(away > farthest)) continue;
    farthest = away;
    best = time;
  }
  return best;
}

/** The nearest tooth event of the wheel. */
export function nearestTooth(wheel: PlotWheel, at: number): number | null {
  return nearest(wheel.teethS, at);
}
