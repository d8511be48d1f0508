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
  /** Value of the sample nearest to the start and to the end. */
  readonly atStart: number | null;
  readonly atEnd: number | null;
  /**
   * Mean over the span, holes left out: of the samples where they come at one step, else over time (a held value as long as it
   * holds, a straight line between two samples). Null while only columns are at hand.
   */
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
  if (window.layout === 'columns')
    return { n: null, ...ends, atStart: null, atEnd: null, mean: null, difference: null };

  const values = window.signals.get(signal.index);
  let n = 0;
  let sum = 0;
  for (let i = 0; values !== undefined && i < window.count; i += 1) {
    const time = window.times[i]!;
    if (time < from || time > to || Number.isNaN(values[i]!)) continue;
    n += 1;
    sum += values[i]!;
  }
  const mean =
    values === undefined
      ? null
      : window.even
        ? n === 0
          ? null
          : sum / n
        : meanOverTime(window, values, from, to);
  const atStart = nearestValue(window, signal, from);
  const atEnd = nearestValue(window, signal, to);
  return {
    n,
    ...ends,
    atStart,
    atEnd,
    mean: mean === null ? null : mean * signal.factor + signal.offset,
    difference: atStart === null || atEnd === null ? null : atEnd - atStart,
  };
}

/** Area under what is drawn over its length; null where nothing is. */
function meanOverTime(
  { times, count, holds, to: end }: Extract<DecodedWindow, { layout: 'samples' }>,
  values: Float32Array,
  from: number,
  to: number,
): number | null {
  let area = 0;
  let length = 0;
  for (let i = 0; i < count; i += 1) {
    const next = i + 1 < count ? times[i + 1]! : holds ? Math.max(end, times[i]!) : times[i]!;
    const left = Math.max(times[i]!, from);
    const right = Math.min(next, to);
    const here = values[i]!;
    const after = holds ? here : values[i + 1]!;
    if (!(right > left) || Number.isNaN(here) || Number.isNaN(after)) continue;
    const slope = (after - here) / (next - times[i]!);
    area += (right - left) * (here + slope * ((left + right) / 2 - times[i]!));
    length += right - left;
  }
  return length > 0 ? area / length : null;
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
