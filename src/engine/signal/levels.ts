/** The two states of a two-level signal. All in the signal's own unit. */
export interface StateLevels {
  readonly low: number;
  readonly high: number;
  /** Midway between the states. */
  readonly mesial: number;
  readonly lowest: number;
  readonly highest: number;
  /** Share of samples above the mesial level, 0 to 1. */
  readonly highShare: number;
  /**
   * Otsu's ratio: variance between the two halves over the whole variance, 0 to 1. Two clean levels give nearly 1,
   * a sine 0.81, an even spread 0.75, plain noise 0.64: below about 0.87 there are no two levels to speak of.
   */
  readonly bimodality: number;
}

const BINS = 256;

/**
 * State levels by the histogram method of IEEE Std 181: the span is cut into bins, the histogram is split at the
 * middle of the span, and each state is the mode of its half. The mode is taken from a lightly smoothed histogram
 * and refined by the mean of the samples about it, so that a level is not tied to the width of a bin.
 *
 * @param range limits of the histogram; samples outside are left out. Default: the signal's own span.
 * @returns null for no finite sample or no span (a flat line has no two states). NaN (holes) are left out.
 */
export function stateLevels(
  values: Float32Array,
  range?: { readonly low: number; readonly high: number },
): StateLevels | null {
  const span = extent(values);
  if (!span) return null;
  const lowest = range ? Math.max(range.low, span.lowest) : span.lowest;
  const highest = range ? Math.min(range.high, span.highest) : span.highest;
  if (!(highest > lowest)) return null;

  const counts = histogram(values, lowest, highest, BINS);
  const width = (highest - lowest) / BINS;
  const centre = (bin: number) => lowest + (bin + 0.5) * width;
  const low = mode(counts, 0, BINS / 2);
  const high = mode(counts, BINS / 2, BINS);
  if (low === null || high === null) return null;
  const lowLevel = refine(values, centre(low), width * 2.5);
  const highLevel = refine(values, centre(high), width * 2.5);

  const mesial = (lowLevel + highLevel) / 2;
  let total = 0;
  let sum = 0;
  let squares = 0;
  let above = 0;
  let aboveSum = 0;
  for (let bin = 0; bin < BINS; bin += 1) {
    const count = counts[bin]!;
    const at = centre(bin);
    total += count;
    sum += count * at;
    squares += count * at * at;
    if (at >= mesial) {
      above += count;
      aboveSum += count * at;
    }
  }
  const mean = sum / total;
  const variance = squares / total - mean * mean;
  const share = above / total;
  const between =
    share > 0 && share < 1
      ? share * (1 - share) * (aboveSum / above - (sum - aboveSum) / (total - above)) ** 2
      : 0;
  return {
    low: lowLevel,
    high: highLevel,
    mesial,
    lowest: span.lowest,
    highest: span.highest,
    highShare: share,
    bimodality: variance > 0 ? Math.min(1, between / variance) : 0,
  };
}

export interface Extent {
  readonly lowest: number;
  readonly highest: number;
}

/** Lowest and highest finite sample; null when there is none. */
export function extent(values: Float32Array): Extent | null {
  let lowest = Infinity;
  let highest = -Infinity;
  for (let i = 0; i < values.length; i += 1) {
    const value = values[i]!;
    if (value < lowest) lowest = value;
    if (value > highest) highest = value;
  }
  return highest >= lowest ? { lowest, highest } : null;
}

/**
 * Counts of samples in `bins` equal parts from `lowest` to `highest`, both ends included; others and NaN are left out.
 * Four part histograms side by side: neighbouring samples mostly fall in one bin, and would wait for each other.
 */
export function histogram(values: Float32Array, lowest: number, highest: number, bins: number): Uint32Array {
  const scale = bins / (highest - lowest);
  const parts = new Uint32Array((bins + 1) * 4);
  const stride = bins + 1;
  let part = 0;
  for (let i = 0; i < values.length; i += 1) {
    const value = values[i]!;
    if (value >= lowest && value <= highest) parts[(part + (value - lowest) * scale) | 0]! += 1;
    part = part === stride * 3 ? 0 : part + stride;
  }
  const counts = new Uint32Array(bins);
  for (let p = 0; p < 4; p += 1) {
    for (let bin = 0; bin < bins; bin += 1) counts[bin]! += parts[p * stride + bin]!;
    counts[bins - 1]! += parts[p * stride + bins]!;
  }
  return counts;
}

function mode(counts: Uint32Array, from: number, to: number): number | null {
  let best: number | null = null;
  let most = 0;
  for (let bin = from; bin < to; bin += 1) {
    const smooth =
      (bin > from ? counts[bin - 1]! : 0) + 2 * counts[bin]! + (bin + 1 < to ? counts[bin + 1]! : 0);
    if (smooth > most) {
      most = smooth;
      best = bin;
    }
  }
  return best;
}

/** Mean of the samples within `reach` of `level`, twice, looking at no more than about 100,000 samples. */
function refine(values: Float32Array, level: number, reach: number): number {
  const step = Math.max(1, Math.floor(values.length / 100_000));
  let centre = level;
  for (let round = 0; round < 2; round += 1) {
    let sum = 0;
    let count = 0;
    for (let i = 0; i < values.length; i += step) {
      const value = values[i]!;
      if (Math.abs(value - centre) <= reach) {
        sum += value;
        count += 1;
      }
    }
    if (count > 0) centre = sum / count;
  }
  return centre;
}
