import { mapped } from '../../signal/mapped.ts';
import type { Pickup } from './pickup.ts';
import type { BlockMeans } from './scale.ts';

/** Zero crossings of one direction, and how high the signal swings about each. */
export interface Passages {
  readonly count: number;
  /** Fractional sample index of the crossing of the local baseline. */
  readonly at: Float64Array;
  /** Highest less lowest value about the crossing, in the signal's unit. */
  readonly swing: Float64Array;
  /** Answer of the tooth filter: as the swing, but without spikes and noise. Comparable where the half-width is one. */
  readonly height: Float64Array;
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
  const samples = means.level(0);
  const sign = kind === 'falling' ? 1 : -1;

  const centre = mapped(chosen, (k) => swings.at[k]!);
  const sums = new Float64Array(count);
  const lengths = new Float64Array(count);
  for (let k = 0; k + 1 < count; k += 1) {
    const octave = Math.max(0, Math.log2(swings.halfWidth[chosen[k]!]!) - 3);
    const level = means.level(octave);
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
    at[k] = crossing(means, centre[k]!, width, smooth, baseline, sign);
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
  const height = mapped(chosen, (k) => Math.abs(swings.height[k]!));
  return { count, at, swing, height, halfWidth };
}

/** Odd number of samples to average: none needed when noise is under a hundredth of the swing. */
function smoothing(width: number, noise: number, height: number): number {
  const needed = (noise / (0.01 * height)) ** 2;
  const most = Math.max(1, Math.floor(width / 3));
  const samples = Math.min(most, Math.max(1, Math.ceil(needed)));
  return samples % 2 === 1 ? samples : samples - 1;
}

/**
 * Crossing of the baseline on the largest fall (times `sign`) about `centre`: from the lobe before the tooth's centre to
 * the lobe after it, never in the flat stretch beside them. Found in block means with a running median, which no spike
 * passes, then placed among the samples. `centre` itself when there is none.
 */
function crossing(
  means: BlockMeans,
  centre: number,
  width: number,
  smooth: number,
  baseline: number,
  sign: number,
): number {
  const octave = Math.max(0, Math.log2(width) - 3);
  const level = means.level(octave);
  const size = 2 ** octave;
  const reach = Math.max(2, Math.ceil((width * 1.2) / size));
  const middle = Math.round((centre + 0.5) / size - 0.5);
  const from = Math.max(0, middle - reach);
  const to = Math.min(level.length - 1, middle + reach);
  if (to <= from) return centre;
  const medianArm = width >= 8 ? 2 : width >= 4 ? 1 : 0;
  let previous = sign * (localMedian(level, from, medianArm) - baseline);
  let peak = previous;
  let crossed = Number.NaN;
  let best = Number.NaN;
  let deepest = 0;
  for (let i = from + 1; i <= to; i += 1) {
    const here = sign * (localMedian(level, i, medianArm) - baseline);
    if (here > peak) {
      peak = here;
      crossed = Number.NaN;
    }
    if (previous > 0 && here <= 0) crossed = i - 1 + previous / (previous - here);
    if (peak - here > deepest && !Number.isNaN(crossed)) {
      deepest = peak - here;
      best = crossed;
    }
    previous = here;
  }
  if (Number.isNaN(best)) return centre;
  const coarse = (best + 0.5) * size - 0.5;
  return among(means.level(0), coarse, size, smooth, baseline, sign);
}

/** The crossing of the samples' running mean nearest to `coarse`, at most one block away; else `coarse`. */
function among(
  samples: Float32Array,
  coarse: number,
  size: number,
  smooth: number,
  baseline: number,
  sign: number,
): number {
  const arm = (smooth - 1) / 2;
  const from = Math.max(arm, Math.floor(coarse) - size - 1);
  const to = Math.min(samples.length - 1 - arm, Math.ceil(coarse) + size + 1);
  if (to <= from) return coarse;
  let sum = 0;
  for (let i = from - arm; i <= from + arm; i += 1) sum += samples[i]!;
  let best = coarse;
  let nearest = size + 1;
  let previous = sign * (sum / smooth - baseline);
  for (let i = from + 1; i <= to; i += 1) {
    sum += samples[i + arm]! - samples[i - arm - 1]!;
    const here = sign * (sum / smooth - baseline);
    if (previous > 0 && here <= 0) {
      const place = i - 1 + previous / (previous - here);
      if (Math.abs(place - coarse) < nearest) {
        nearest = Math.abs(place - coarse);
        best = place;
      }
    }
    previous = here;
  }
  return best;
}

/** Median of the block at `index` and its `arm` neighbours on either side, the ends going on. */
function localMedian(level: Float32Array, index: number, arm: number): number {
  if (arm === 0) return level[index]!;
  const last = level.length - 1;
  const at = (i: number) => level[Math.max(0, Math.min(i, last))]!;
  const here = at(index);
  const b = at(index - 1);
  const d = at(index + 1);
  if (arm === 1) return Math.max(Math.min(b, d), Math.min(here, Math.max(b, d)));
  const a = at(index - 2);
  const e = at(index + 2);
  const low = Math.max(Math.min(a, b), Math.min(d, e));
  const high = Math.min(Math.max(a, b), Math.max(d, e));
  return Math.max(Math.min(low, high), Math.min(here, Math.max(low, high)));
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
