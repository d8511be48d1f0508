import { histogram } from './levels.ts';
import { quantileSorted } from './statistics.ts';

/** The level that most samples are at. */
export interface FullestLevel {
  readonly level: number;
  /** Share of all the samples that lie at it, 0 to 1. */
  readonly share: number;
}

const BINS = 1024;

/**
 * Fullest level of rising `sorted` samples from `low` to `high`: the mode of a histogram smoothed over twice the noise,
 * refined to the median of the samples about it. No samples there: share 0.
 */
export function fullestLevel(sorted: Float32Array, low: number, high: number, noise: number): FullestLevel {
  if (!(high > low)) {
    const at = within(sorted, low, high === low ? nextUp(high) : high);
    return { level: low, share: sorted.length > 0 ? at.length / sorted.length : 0 };
  }
  const counts = histogram(sorted, low, high, BINS);
  const width = (high - low) / BINS;
  const reach = Math.min(BINS / 8, Math.max(3, Math.ceil((2 * noise) / width)));
  let sum = 0;
  let most = -1;
  let at = 0;
  for (let bin = -reach; bin < BINS; bin += 1) {
    sum += (counts[bin + reach] ?? 0) - (counts[bin - reach - 1] ?? 0);
    if (bin >= 0 && sum > most) {
      most = sum;
      at = bin;
    }
  }
  const centre = low + (at + 0.5) * width;
  const near = within(sorted, centre - (reach + 0.5) * width, centre + (reach + 0.5) * width);
  return {
    level: near.length > 0 ? quantileSorted(near, 0.5) : centre,
    share: sorted.length > 0 ? near.length / sorted.length : 0,
  };
}

/** Those of rising `sorted` from `low` up to, not including, `high`. */
export function within(sorted: Float32Array, low: number, high: number): Float32Array {
  return sorted.subarray(place(sorted, low), place(sorted, high));
}

const nextUp = (value: number) => value + Math.max(Math.abs(value) * 1e-6, Number.MIN_VALUE);

/** First place in rising `sorted` at or after `value`. */
function place(sorted: Float32Array, value: number): number {
  let low = 0;
  let high = sorted.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (sorted[middle]! < value) low = middle + 1;
    else high = middle;
  }
  return low;
}
