import type { DecodedWindow } from './decode-window.ts';
import { lastAtOrBefore } from './degrees.ts';
import { extentOf } from './line-data.ts';
import type { PlotSignal } from './types.ts';

/** What one signal does between two times, in its own unit. Null where the window at hand cannot tell. */
export interface SpanStatistics {
  /** Samples in the span; null while only columns are at hand. */
  readonly n: number | null;
  readonly lowest: number | null;
  readonly highest: number | null;
  /** Plain mean of the samples (holes left out); null while only columns are at hand. */
  readonly mean: number | null;
  /** Value at the end less value at the start; null while only columns are at hand. */
  readonly difference: number | null;
}

/**
 * Lowest and highest are exact from columns too (to the width of a column at the ends); mean and difference need the
 * samples and are null until those are at hand. Never a figure made from summaries.
 */
export function spanStatistics(
  window: DecodedWindow,
  signal: PlotSignal,
  from: number,
  to: number,
): SpanStatistics {
  const extent = extentOf(window, signal, from, to);
  const ends = { lowest: extent?.lowest ?? null, highest: extent?.highest ?? null };
  if (window.layout === 'columns') return { n: null, ...ends, mean: null, difference: null };

  const values = window.signals.get(signal.index);
  let n = 0;
  let sum = 0;
  for (let i = 0; values !== undefined && i < window.count; i += 1) {
    const time = window.times[i]!;
    if (time < from || time > to || Number.isNaN(values[i]!)) continue;
    n += 1;
    sum += values[i]!;
  }
  const start = nearestValue(window, signal, from);
  const end = nearestValue(window, signal, to);
  return {
    n,
    ...ends,
    mean: n === 0 ? null : (sum / n) * signal.factor + signal.offset,
    difference: start === null || end === null ? null : end - start,
  };
}

/** Value of the sample nearest to a time, in the signal's unit; null for a hole, outside, or while only columns are at hand. */
export function nearestValue(window: DecodedWindow, signal: PlotSignal, timeS: number): number | null {
  const values = window.signals.get(signal.index);
  if (window.layout !== 'samples' || values === undefined || window.count === 0) return null;
  const below = Math.max(lastAtOrBefore(window.times, timeS), 0);
  const above = Math.min(below + 1, window.count - 1);
  const nearer =
    !window.holds && Math.abs(window.times[above]! - timeS) < Math.abs(timeS - window.times[below]!)
      ? above
      : below;
  const value = values[nearer]!;
  return Number.isNaN(value) ? null : value * signal.factor + signal.offset;
}

/** What stands under the cursor: one sample, or the lowest and highest of the column there; null for a hole. */
export function valueUnder(
  window: DecodedWindow,
  signal: PlotSignal,
  timeS: number,
): { lowest: number; highest: number } | null {
  if (window.layout === 'samples') {
    const value = nearestValue(window, signal, timeS);
    return value === null ? null : { lowest: value, highest: value };
  }
  return extentOf(window, signal, timeS, timeS + 1e-12);
}
