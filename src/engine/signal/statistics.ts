/** Plain statistics over finite numbers. NaN are left out; no finite number gives null, never NaN or 0. */

type Numbers = ArrayLike<number>;

/** Arithmetic mean. */
export function mean(values: Numbers): number | null {
  let sum = 0;
  let count = 0;
  for (let i = 0; i < values.length; i += 1) {
    const value = values[i]!;
    if (!Number.isNaN(value)) {
      sum += value;
      count += 1;
    }
  }
  return count > 0 ? sum / count : null;
}

export interface Spread {
  readonly n: number;
  readonly mean: number;
  readonly min: number;
  readonly max: number;
  /** Standard deviation of the sample (n − 1); 0 for one number. */
  readonly sd: number;
}

/** Mean, ends and standard deviation (Welford's recurrence, so that a large offset costs no digits). */
export function spread(values: Numbers): Spread | null {
  let n = 0;
  let average = 0;
  let squares = 0;
  let min = Infinity;
  let max = -Infinity;
  for (let i = 0; i < values.length; i += 1) {
    const value = values[i]!;
    if (Number.isNaN(value)) continue;
    n += 1;
    const delta = value - average;
    average += delta / n;
    squares += delta * (value - average);
    if (value < min) min = value;
    if (value > max) max = value;
  }
  return n > 0 ? { n, mean: average, min, max, sd: n > 1 ? Math.sqrt(squares / (n - 1)) : 0 } : null;
}

/** Standard deviation of the sample (n − 1). */
export const standardDeviation = (values: Numbers): number | null => spread(values)?.sd ?? null;

/** Quantile `q` (0 to 1) by linear interpolation between order statistics (R type 7). */
export function quantile(values: Numbers, q: number): number | null {
  const sorted = finite(values).sort();
  return sorted.length > 0 ? quantileSorted(sorted, q) : null;
}

/** As `quantile`, of numbers already in rising order, at least one. */
export function quantileSorted(sorted: Numbers, q: number): number {
  const place = Math.min(Math.max(q, 0), 1) * (sorted.length - 1);
  const below = Math.floor(place);
  const here = sorted[below]!;
  return below + 1 < sorted.length ? here + (sorted[below + 1]! - here) * (place - below) : here;
}

/** Middle value. */
export const median = (values: Numbers): number | null => quantile(values, 0.5);

/** Median distance from the median, times 1.4826: the standard deviation of normal noise without its outliers. */
export function robustDeviation(values: Numbers): number | null {
  const middle = median(values);
  if (middle === null) return null;
  const distances = finite(values);
  for (let i = 0; i < distances.length; i += 1) distances[i] = Math.abs(distances[i]! - middle);
  return 1.4826 * median(distances)!;
}

/**
 * Standard deviation of white noise on a smooth signal, from second differences x[i-1] - 2x[i] + x[i+1], whose
 * deviation is √6 of the noise's. Median-based, so edges and spikes do not count. At most `most` places are looked at,
 * evenly over the signal. A straight line gives 0; too few samples null.
 */
export function noiseDeviation(values: Float32Array, most = 20_000): number | null {
  const places = values.length - 2;
  if (places < 8) return null;
  const step = Math.max(1, Math.floor(places / most));
  const differences = new Float64Array(Math.ceil(places / step));
  let count = 0;
  for (let i = 1; i <= places; i += step) {
    const second = values[i - 1]! - 2 * values[i]! + values[i + 1]!;
    if (!Number.isNaN(second)) {
      differences[count] = Math.abs(second);
      count += 1;
    }
  }
  const middle = median(differences.subarray(0, count));
  return middle === null ? null : (middle * 1.4826) / Math.sqrt(6);
}

function finite(values: Numbers): Float64Array {
  const kept = new Float64Array(values.length);
  let count = 0;
  for (let i = 0; i < values.length; i += 1) {
    const value = values[i]!;
    if (!Number.isNaN(value)) {
      kept[count] = value;
      count += 1;
    }
  }
  return kept.slice(0, count);
}
