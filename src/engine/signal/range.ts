/**
 * Plain statistics of samples `from` up to, not including, `to`. Holes (NaN) are skipped; a range with no finite sample
 * gives null (or index −1 for none, which callers must test). Ranges are cut to the array.
 */

import { quantileSorted } from './statistics.ts';

const MOST = 20_000;

/** Finite samples of the range in rising order, at most `most` of them, taken evenly over the range. */
export function sortedRange(values: Float32Array, from: number, to: number, most = MOST): Float32Array {
  const start = Math.max(0, Math.ceil(from));
  const end = Math.min(values.length, Math.ceil(to));
  const step = Math.max(1, Math.ceil((end - start) / most));
  const kept = new Float32Array(Math.max(0, Math.ceil((end - start) / step)));
  let count = 0;
  for (let i = start; i < end; i += step) {
    const value = values[i]!;
    if (Number.isNaN(value)) continue;
    kept[count] = value;
    count += 1;
  }
  return kept.subarray(0, count).sort();
}

/** Median of the range; exact up to 20,000 samples, of an even choice of them beyond. */
export function rangeMedian(values: Float32Array, from: number, to: number): number | null {
  const sorted = sortedRange(values, from, to);
  return sorted.length > 0 ? quantileSorted(sorted, 0.5) : null;
}

export function rangeMean(values: Float32Array, from: number, to: number): number | null {
  let sum = 0;
  let count = 0;
  const end = Math.min(values.length, Math.ceil(to));
  for (let i = Math.max(0, Math.ceil(from)); i < end; i += 1) {
    const value = values[i]!;
    if (Number.isNaN(value)) continue;
    sum += value;
    count += 1;
  }
  return count > 0 ? sum / count : null;
}

/** Index of the first highest sample of the range; −1 when every sample is a hole. */
export function highestIn(values: Float32Array, from: number, to: number): number {
  let best = -1;
  let highest = Number.NEGATIVE_INFINITY;
  const end = Math.min(values.length, Math.ceil(to));
  for (let i = Math.max(0, Math.ceil(from)); i < end; i += 1) {
    const value = values[i]!;
    if (value > highest) {
      highest = value;
      best = i;
    }
  }
  return best;
}

/** Index of the first lowest sample of the range; −1 when every sample is a hole. */
export function lowestIn(values: Float32Array, from: number, to: number): number {
  let best = -1;
  let lowest = Number.POSITIVE_INFINITY;
  const end = Math.min(values.length, Math.ceil(to));
  for (let i = Math.max(0, Math.ceil(from)); i < end; i += 1) {
    const value = values[i]!;
    if (value < lowest) {
      lowest = value;
      best = i;
    }
  }
  return best;
}
