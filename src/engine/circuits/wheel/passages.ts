import type { Pickup } from './pickup.ts';

/** Zero crossings of one direction, and how high the signal swings about each. */
export interface Passages {
  readonly count: number;
  /** Fractional sample index of the crossing of the local baseline. */
  readonly at: Float64Array;
  /** Highest less lowest value about the crossing, in the signal's unit. */
  readonly swing: Float64Array;
  /** Half-width of the tooth filter there, in samples. */
  readonly halfWidth: Float64Array;
}

/** Teeth on either side whose mean is the baseline: the flux at two tooth centres is the same, so the mean between them is 0. */
const BASELINE_TEETH = 3;

/**
 * Places each passage where the signal crosses its local baseline: the mean over whole teeth on both sides, so that
 * neither an offset nor a slow drift shifts the moment. The signal is smoothed over a third of the filter's half-width
 * (an eighth of the swing) where it is noisy, and not at all where it is clean.
 */
export function placePassages(pickup: Pickup, kind: 'falling' | 'rising'): Passages {
  const { means, swings, noise } = pickup;
  const chosen = pickup[kind];
  const count = chosen.length;
  const at = new Float64Array(count);
  const swing = new Float64Array(count);
  const halfWidth = new Float64Array(count);
  const samples = means.levels[0]!;
  const sign = kind === 'falling' ? 1 : -1;

  const centre = Float64Array.from(chosen, (k) => swings.at[k]!);
  const sums = new Float64Array(count);
  const lengths = new Float64Array(count);
  for (let k = 0; k + 1 < count; k += 1) {
    const octave = Math.max(0, Math.log2(swings.halfWidth[chosen[k]!]!) - 3);
    const level = means.levels[octave]!;
    const size = 2 ** octave;
    const from = Math.round((centre[k]! + 0.5) / size);
    const to = Math.min(level.length, Math.round((centre[k + 1]! + 0.5) / size));
    let sum = 0;
    for (let b = from; b < to; b += 1) sum += level[b]!;
    sums[k] = sum * size;
    lengths[k] = (to - from) * size;
  }

  for (let k = 0; k < count; k += 1) {
    const width = swings.halfWidth[chosen[k]!]!;
    halfWidth[k] = width;
    let sum = 0;
    let length = 0;
    for (let i = Math.max(0, k - BASELINE_TEETH); i < Math.min(count - 1, k + BASELINE_TEETH); i += 1) {
      sum += sums[i]!;
      length += lengths[i]!;
    }
    const baseline = length > 0 ? sum / length : 0;
    const height = Math.abs(swings.height[chosen[k]!]!);
    const smooth = smoothing(width, noise, height);
    at[k] = crossing(samples, centre[k]!, width, smooth, baseline, sign);
  }
  for (let k = 0; k < count; k += 1) {
    // No further than half-way to the neighbours, whose lobes would be taken for this tooth's.
    const near = Math.min(
      k > 0 ? at[k]! - at[k - 1]! : Infinity,
      k + 1 < count ? at[k + 1]! - at[k]! : Infinity,
    );
    const reach = Math.min(1.5 * halfWidth[k]!, near / 2);
    swing[k] = heightAbout(
      samples,
      at[k]!,
      reach,
      smoothing(halfWidth[k]!, noise, Math.abs(swings.height[chosen[k]!]!)),
    );
  }
  return { count, at, swing, halfWidth };
}

/** Odd number of samples to average: none needed when noise is under a hundredth of the swing. */
function smoothing(width: number, noise: number, height: number): number {
  const needed = (noise / (0.01 * height)) ** 2;
  const most = Math.max(1, Math.floor(width / 3));
  const samples = Math.min(most, Math.max(1, Math.ceil(needed)));
  return samples % 2 === 1 ? samples : samples - 1;
}

/** Crossing in the wanted direction nearest to `centre`, of the running mean; `centre` itself when there is none. */
function crossing(
  samples: Float32Array,
  centre: number,
  width: number,
  smooth: number,
  baseline: number,
  sign: number,
): number {
  const reach = Math.max(2, Math.ceil(width * 0.9));
  const arm = (smooth - 1) / 2;
  const from = Math.max(arm, Math.floor(centre) - reach);
  const to = Math.min(samples.length - 1 - arm, Math.ceil(centre) + reach);
  if (to <= from) return centre;
  let sum = 0;
  for (let i = from - arm; i <= from + arm; i += 1) sum += samples[i]!;
  let best = centre;
  let nearest = Infinity;
  let previous = sign * (sum / smooth - baseline);
  for (let i = from + 1; i <= to; i += 1) {
    sum += samples[i + arm]! - samples[i - arm - 1]!;
    const here = sign * (sum / smooth - baseline);
    if (previous > 0 && here <= 0) {
      const place = i - 1 + previous / (previous - here);
      const distance = Math.abs(place - centre);
      if (distance < nearest) {
        nearest = distance;
        best = place;
      }
    }
    previous = here;
  }
  return best;
}

/** Highest less lowest of the running mean within `reach` samples of the crossing. */
function heightAbout(samples: Float32Array, at: number, reach: number, smooth: number): number {
  const arm = (smooth - 1) / 2;
  const from = Math.max(arm, Math.floor(at - reach));
  const to = Math.min(samples.length - 1 - arm, Math.ceil(at + reach));
  if (to <= from) return Number.NaN;
  let sum = 0;
  for (let i = from - arm; i <= from + arm; i += 1) sum += samples[i]!;
  let lowest = sum;
  let highest = sum;
  for (let i = from + 1; i <= to; i += 1) {
    sum += samples[i + arm]! - samples[i - arm - 1]!;
    if (sum < lowest) lowest = sum;
    if (sum > highest) highest = sum;
  }
  return (highest - lowest) / smooth;
}
