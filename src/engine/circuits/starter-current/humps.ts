import { type EvenMeans, movingMean } from '../../signal/even-means.ts';
import { findPeaks } from '../../signal/peaks.ts';
import { spectrum, strongestIn } from '../../signal/spectrum.ts';
import { median } from '../../signal/statistics.ts';

/** Compressions a second that an engine of 1 to 12 cylinders makes while it is cranked. Common practice, no source. */
export const LOWEST_HZ = 1.5;
export const HIGHEST_HZ = 40;
/** An engine that runs up shortens the time between its compressions by less than this from one to the next. Common practice, no source. */
const RUN_UP = 1.6;

/** One compression: where its hump stands (place in the means, fractions allowed) and how high over the valleys beside it. */
export interface Hump {
  readonly at: number;
  readonly height: number;
  /** No maximum of its own; its place follows from its neighbours (a cylinder without compression). */
  readonly inferred: boolean;
}

/** Compression rate from the spectrum of the means in [from, to); null when nothing stands out. */
export function spectralRate(means: EvenMeans, from: number, to: number): number | null {
  const part = means.values.slice(from, to);
  const lengthS = part.length * means.stepS;
  if (lengthS < 3 / HIGHEST_HZ) return null;
  const detrended = withoutTrend(part);
  const found = spectrum(detrended, { sampleRateHz: 1 / means.stepS, padding: 8 });
  const peak =
    found && strongestIn(found, Math.max(LOWEST_HZ, 1.5 / lengthS), Math.min(HIGHEST_HZ, 0.4 / means.stepS));
  return peak && peak.prominence > 5 ? peak.frequencyHz : null;
}

/** Humps in [from, to) when about `rateHz` compressions a second are expected; in order, gaps filled in where one is missing. */
export function findHumps(means: EvenMeans, from: number, to: number, rateHz: number): Hump[] {
  const period = 1 / (rateHz * means.stepS);
  const smooth = movingMean(movingMean(means.values.subarray(from, to), period / 6), period / 6);
  const peaks = findPeaks(smooth, { distance: 0.5 * period });
  const usual = median(peaks.map((peak) => peak.prominence)) ?? 0;
  const kept = peaks
    .filter((peak) => peak.prominence >= 0.25 * usual)
    .map((peak) => vertex(smooth, peak.index));
  const runUp = runUpTo(kept);
  const places: Array<{ at: number; inferred: boolean }> = [];
  kept.forEach((at, k) => {
    const before = kept[k - 1];
    const steps = before === undefined || k <= runUp ? 1 : Math.round((at - before) / period);
    for (let j = 1; j < steps; j += 1)
      places.push({ at: before! + ((at - before!) * j) / steps, inferred: true });
    places.push({ at, inferred: false });
  });
  return places.map(({ at, inferred }, k) => {
    const before = at - (places[k - 1]?.at ?? at - Math.max(period, (places[k + 1]?.at ?? 0) - at));
    const after = (places[k + 1]?.at ?? at + Math.max(period, before)) - at;
    return { at: from + at, inferred, height: heightOf(smooth, at, 0.75 * before, 0.75 * after) };
  });
}

/** Last hump of an engine that is still running up: from the first on, each distance is a little shorter than the one before. */
function runUpTo(places: readonly number[]): number {
  let k = 0;
  for (; k + 2 < places.length; k += 1) {
    const shortening = (places[k + 1]! - places[k]!) / (places[k + 2]! - places[k + 1]!);
    if (shortening < 1.03 || shortening > RUN_UP) break;
  }
  return k;
}

/** Height over the mean of the lowest points within reach on either side: three quarters of the way to the next hump there. */
function heightOf(smooth: Float64Array, at: number, before: number, after: number): number {
  const middle = Math.round(at);
  const least = (from: number, to: number) => {
    let lowest = Number.POSITIVE_INFINITY;
    for (let i = Math.max(0, from); i < Math.min(smooth.length, to); i += 1)
      lowest = Math.min(lowest, smooth[i]!);
    return lowest;
  };
  const valley =
    (least(middle - Math.round(before), middle + 1) + least(middle, middle + Math.round(after) + 1)) / 2;
  return smooth[middle]! - valley;
}

/** Top of the parabola through a maximum and its neighbours. */
function vertex(values: Float64Array, index: number): number {
  const [a, b, c] = [values[index - 1]!, values[index]!, values[index + 1]!];
  const bend = a - 2 * b + c;
  return bend < 0 ? index + (0.5 * (a - c)) / bend : index;
}

/** Less the least-squares line. */
function withoutTrend(values: Float64Array): Float64Array {
  const n = values.length;
  const middle = (n - 1) / 2;
  let mean = 0;
  let slope = 0;
  for (let i = 0; i < n; i += 1) {
    mean += values[i]! / n;
    slope += values[i]! * (i - middle);
  }
  slope /= (n * (n * n - 1)) / 12 || 1;
  return values.map((value, i) => value - mean - slope * (i - middle));
}
