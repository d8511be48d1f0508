import type { TimeAxis } from '../capture.ts';
import { sampleCount, timeAt } from './time.ts';

/** A signal brought down to a lower, even rate: means over equal steps of time. */
export interface EvenMeans {
  /** Middle of the first step. */
  readonly startS: number;
  readonly stepS: number;
  readonly values: Float64Array;
}

/**
 * Means over steps of at least `stepS` (a whole number of samples on an even axis, so that every mean has as many). Holes are
 * skipped; steps without a sample are bridged by a straight line. No finite sample: null.
 */
export function evenMeans(values: Float32Array, axis: TimeAxis, stepS: number): EvenMeans | null {
  const count = sampleCount(axis);
  if (count < 2) return null;
  const firstS = timeAt(axis, 0);
  const wholeS = timeAt(axis, count - 1) - firstS;
  const size = axis.kind === 'even' ? Math.max(1, Math.round(stepS / axis.stepS)) : 0;
  const step = axis.kind === 'even' ? size * axis.stepS : Math.max(stepS, wholeS / count);
  const bins = axis.kind === 'even' ? Math.floor(count / size) : Math.floor(wholeS / step);
  if (bins < 1) return null;
  const sums = new Float64Array(bins);
  const counts = new Uint32Array(bins);
  for (let i = 0; i < count; i += 1) {
    const value = values[i]!;
    const bin = axis.kind === 'even' ? Math.floor(i / size) : Math.floor((timeAt(axis, i) - firstS) / step);
    if (bin >= bins || Number.isNaN(value)) continue;
    sums[bin]! += value;
    counts[bin]! += 1;
  }
  let last = -1;
  for (let bin = 0; bin < bins; bin += 1) {
    if (counts[bin] === 0) continue;
    sums[bin]! /= counts[bin]!;
    for (let gap = last + 1; gap < bin; gap += 1) {
      const from = last < 0 ? sums[bin]! : sums[last]!;
      sums[gap] = from + ((sums[bin]! - from) * (gap - last)) / (bin - last);
    }
    last = bin;
  }
  if (last < 0) return null;
  for (let bin = last + 1; bin < bins; bin += 1) sums[bin] = sums[last]!;
  const middle = axis.kind === 'even' ? ((size - 1) / 2) * axis.stepS : step / 2;
  return { startS: firstS + middle, stepS: step, values: sums };
}

/** Centred moving average over `width` values (made odd); at the ends over what is there. */
export function movingMean(values: Float64Array, width: number): Float64Array {
  const reach = Math.max(0, Math.floor(width / 2));
  const sums = new Float64Array(values.length + 1);
  for (let i = 0; i < values.length; i += 1) sums[i + 1] = sums[i]! + values[i]!;
  return values.map((_, i) => {
    const from = Math.max(0, i - reach);
    const to = Math.min(values.length, i + reach + 1);
    return (sums[to]! - sums[from]!) / (to - from);
  });
}
