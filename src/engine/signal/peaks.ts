/**
 * Peaks of a sampled curve: local maxima chosen by distance and prominence, by the definitions of SciPy's `find_peaks`
 * (docs.scipy.org, scipy.signal.find_peaks and peak_prominences), so that results can be compared sample by sample.
 */
export interface Peak {
  readonly index: number;
  readonly height: number;
  /** Height above the higher of the two lowest points that part it from higher ground on either side. */
  readonly prominence: number;
}

export interface PeakOptions {
  /** Least prominence. Default 0: every local maximum. */
  readonly prominence?: number;
  /** Least distance in samples; of peaks closer together the lower goes. Default 1. */
  readonly distance?: number;
}

/** Linear in time. A flat top counts once, at its middle (rounded down); the first and last sample are no peaks. NaN are not expected. */
export function findPeaks(values: Float32Array | Float64Array, options: PeakOptions = {}): Peak[] {
  const { prominence = 0, distance = 1 } = options;
  const maxima =
    distance > 1 ? keepApart(values, localMaxima(values), Math.ceil(distance)) : localMaxima(values);
  const left = lowestTowardsHigher(values, 1);
  const right = lowestTowardsHigher(values, -1);
  const peaks: Peak[] = [];
  for (const index of maxima) {
    const height = values[index]!;
    const rise = height - Math.max(left[index]!, right[index]!);
    if (rise >= prominence) peaks.push({ index, height, prominence: rise });
  }
  return peaks;
}

function localMaxima(values: Float32Array | Float64Array): number[] {
  const found: number[] = [];
  for (let i = 1; i < values.length - 1; i += 1) {
    if (!(values[i - 1]! < values[i]!)) continue;
    let end = i;
    while (end + 1 < values.length && values[end + 1] === values[i]) end += 1;
    if (end + 1 < values.length && values[end + 1]! < values[i]!) found.push((i + end) >> 1);
    i = end;
  }
  return found;
}

/** From the highest down, each peak removes those nearer than `distance`; of equal heights the earlier one goes (SciPy leaves that open). */
function keepApart(
  values: Float32Array | Float64Array,
  maxima: readonly number[],
  distance: number,
): number[] {
  const order = maxima.map((_, k) => k).sort((a, b) => values[maxima[b]!]! - values[maxima[a]!]! || b - a);
  const gone = new Uint8Array(maxima.length);
  for (const k of order) {
    if (gone[k]) continue;
    for (let j = k - 1; j >= 0 && maxima[k]! - maxima[j]! < distance; j -= 1) gone[j] = 1;
    for (let j = k + 1; j < maxima.length && maxima[j]! - maxima[k]! < distance; j += 1) gone[j] = 1;
  }
  return maxima.filter((_, k) => !gone[k]);
}

/**
 * For every sample the lowest value between it and the nearest strictly higher sample, looking back (direction 1) or
 * ahead (−1); to the end of the array where nothing is higher. A stack of falling heights keeps this linear.
 */
function lowestTowardsHigher(values: Float32Array | Float64Array, direction: 1 | -1): Float64Array {
  const n = values.length;
  const lowest = new Float64Array(n);
  const stack = new Int32Array(n);
  let depth = 0;
  for (let k = 0; k < n; k += 1) {
    const i = direction === 1 ? k : n - 1 - k;
    let least = values[i]!;
    while (depth > 0 && values[stack[depth - 1]!]! <= values[i]!) {
      depth -= 1;
      least = Math.min(least, lowest[stack[depth]!]!);
    }
    lowest[i] = least;
    stack[depth] = i;
    depth += 1;
  }
  return lowest;
}
