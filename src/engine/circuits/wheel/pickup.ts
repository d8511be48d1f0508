import { mapped } from '../../signal/mapped.ts';
import { runningQuantile } from '../../signal/running-quantile.ts';
import { noiseDeviation } from '../../signal/statistics.ts';
import { BlockMeans, type ScaleTrack, trackScale } from './scale.ts';
import { findSwings, type Swings } from './swings.ts';

/** A two-wire signal brought down to its swings, before anyone knows which passage is a tooth's centre. */
export interface Pickup {
  readonly means: BlockMeans;
  readonly track: ScaleTrack;
  /** White noise of the samples, standard deviation, in the signal's unit. */
  readonly noise: number;
  /** Smallest step between two different samples: the converter's, or that of the printed digits. */
  readonly step: number;
  /** Falling passages first kind, rising ones second, as indexes into `swings`. */
  readonly swings: Swings;
  readonly falling: Int32Array;
  readonly rising: Int32Array;
}

/** A swing must stand this many deviations of the filter's noise out of the rest. */
const NOISE_FACTOR = 6.5;
/** … and be this much of its neighbours' upper quartile: a tooth down to a quarter of its height still is. */
const LOCAL_SHARE = 0.3;

/**
 * Finds the swings of a two-wire pick-up (e = −N dΦ/dt; LM1815 data sheet, SNOSBU8F: one cycle a tooth, height in
 * proportion to speed), through noise, hum, spikes, run-out and a spin-up from rest.
 *
 * @returns null when nothing stands out of the noise.
 */
export function findPickup(values: Float32Array): Pickup | null {
  const samples = bridged(values);
  if (samples.length < 48) return null;
  const means = new BlockMeans(samples);
  const step = smallestStep(samples);
  const noise = Math.max(noiseDeviation(samples) ?? 0, step / Math.sqrt(12));
  const track = trackScale(means, noise);
  if (!track) return null;

  // With few samples a swing the second difference is the swing itself: no more of it is taken for noise than that.
  const floor = (halfWidth: number) =>
    halfWidth < 6 ? step * 1.05 : Math.max(NOISE_FACTOR * noise * Math.sqrt(2 / halfWidth), step * 1.05);
  const swings = prune(findSwings(means, track, floor));
  const falling: number[] = [];
  const rising: number[] = [];
  const heightOf = localHeights(swings);
  for (let k = 0; k < swings.count; k += 1) {
    const height = swings.height[k]!;
    if (height === 0 || Math.abs(height) < LOCAL_SHARE * heightOf[k]!) continue;
    (height > 0 ? falling : rising).push(k);
  }
  if (falling.length + rising.length < 4) return null;
  return {
    means,
    track,
    noise,
    step,
    swings,
    falling: Int32Array.from(falling),
    rising: Int32Array.from(rising),
  };
}

/** Holes filled by a straight line between their neighbours; the same array when there are none. */
function bridged(values: Float32Array): Float32Array {
  let first = 0;
  while (first < values.length && !Number.isNaN(values[first]!)) first += 1;
  if (first === values.length) return values;
  const out = values.slice();
  for (let i = first; i < out.length; i += 1) {
    if (!Number.isNaN(out[i]!)) continue;
    let end = i;
    while (end < out.length && Number.isNaN(out[end]!)) end += 1;
    const before = i > 0 ? out[i - 1]! : (out[end] ?? 0);
    const after = end < out.length ? out[end]! : before;
    for (let k = i; k < end; k += 1) out[k] = before + ((after - before) * (k - i + 1)) / (end - i + 1);
    i = end;
  }
  return out;
}

function smallestStep(values: Float32Array): number {
  const stride = Math.max(1, Math.floor(values.length / 50_000));
  let least = Infinity;
  for (let i = stride; i < values.length; i += stride) {
    const difference = Math.abs(values[i]! - values[i - 1]!);
    // Neighbouring float32 numbers are no step of a converter.
    if (difference < least && difference > Math.abs(values[i]!) * 2e-6 && difference > 0) least = difference;
  }
  return Number.isFinite(least) ? least : 0;
}

/** Drops swings that are small beside their neighbours, and joins what they had cut apart. */
function prune(swings: Swings): Swings {
  const kept = new Int32Array(swings.count);
  const { height } = swings;
  const local = localSwings(swings);
  let count = 0;
  let upward = false;
  for (let k = 0; k < swings.count; k += 1) {
    if (count === 0) {
      kept[count++] = k;
      continue;
    }
    const last = kept[count - 1]!;
    const change = height[k]! - height[last]!;
    const large = Math.abs(change) > LOCAL_SHARE * local[k]!;
    if (count === 1) {
      if (large) {
        upward = change > 0;
        kept[count++] = k;
      } else if (Math.abs(height[k]!) > Math.abs(height[last]!)) kept[0] = k;
    } else if (change > 0 === upward) {
      kept[count - 1] = k;
    } else if (large) {
      upward = change > 0;
      kept[count++] = k;
    }
  }
  const indexes = kept.subarray(0, count);
  return {
    count,
    at: mapped(indexes, (k) => swings.at[k]!),
    height: mapped(indexes, (k) => height[k]!),
    halfWidth: mapped(indexes, (k) => swings.halfWidth[k]!),
  };
}

const NEIGHBOURS = 8;

/** Upper quartile of the changes from extreme to extreme, over the neighbours on both sides. */
function localSwings(swings: Swings): Float64Array {
  const changes = new Float64Array(swings.count);
  for (let k = 1; k < swings.count; k += 1) changes[k] = Math.abs(swings.height[k]! - swings.height[k - 1]!);
  if (swings.count > 1) changes[0] = changes[1]!;
  return upperQuartiles(changes);
}

/** Upper quartile of the heights of each extreme's neighbours of its own kind. */
function localHeights(swings: Swings): Float64Array {
  const out = new Float64Array(swings.count);
  for (const sign of [1, -1]) {
    const indexes: number[] = [];
    for (let k = 0; k < swings.count; k += 1) if (Math.sign(swings.height[k]!) === sign) indexes.push(k);
    const quartiles = upperQuartiles(mapped(indexes, (k) => Math.abs(swings.height[k]!)));
    indexes.forEach((k, i) => {
      out[k] = quartiles[i]!;
    });
  }
  return out;
}

const upperQuartiles = (values: Float64Array) => runningQuantile(values, NEIGHBOURS, 0.75);
