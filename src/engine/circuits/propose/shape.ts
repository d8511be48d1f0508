import type { TimeAxis } from '../../capture.ts';
import { crossings } from '../../signal/crossings.ts';
import { stateLevels } from '../../signal/levels.ts';
import { sortedRange } from '../../signal/range.ts';
import { readingNoise } from '../../signal/resolution.ts';
import { quantileSorted } from '../../signal/statistics.ts';
import { sampleCount, timeAt } from '../../signal/time.ts';

/** What a trace looks like, in its own unit; all that the proposal needs of the samples. */
export interface Shape {
  readonly lowest: number;
  readonly highest: number;
  readonly median: number;
  readonly noise: number;
  /** Nothing but noise. */
  readonly flat: boolean;
  /** Two levels hold nearly all samples. */
  readonly twoLevels: boolean;
  /** Share of samples at the upper level, 0 to 1. */
  readonly highShare: number;
  /** Swings about zero, about as far up as down. */
  readonly aboutZero: boolean;
  /** Complete swings through the middle. */
  readonly swings: number;
  /** Swings a second. */
  readonly swingRateHz: number;
  /** Highest point over the 90 % quantile's height above the lowest 1 %: large for rare kicks. */
  readonly kickRatio: number;
  /** Share of samples above half the highest point. */
  readonly topShare: number;
  /** Share of samples near zero (within 4 % of the span). */
  readonly zeroShare: number;
}

/** Samples times `factor`; null without three finite samples. Looks at the samples twice or three times, linearly. */
export function shapeOf(samples: Float32Array, factor: number, axis: TimeAxis): Shape | null {
  const values = factor === 1 ? samples : samples.map((sample) => sample * factor);
  const sorted = sortedRange(values, 0, values.length, 1 << 18);
  if (sorted.length < 3) return null;
  const lowest = sorted[0]!;
  const highest = sorted[sorted.length - 1]!;
  const span = highest - lowest;
  const noise = readingNoise(values);
  const median = quantileSorted(sorted, 0.5);
  const states = stateLevels(values);
  const q = (share: number) => quantileSorted(sorted, share);
  const holds = axis.kind === 'uneven' && axis.holds;
  const flat =
    span === 0 || (!holds && q(0.999) - q(0.001) <= 10 * noise && span < Math.max(14 * noise, 0.02));
  const middle = (q(0.99) + q(0.01)) / 2;
  const wide = q(0.99) - q(0.01);
  const found = wide > 0 ? crossings(values, { level: middle, hysteresis: 0.4 * wide, holds }).count : 0;
  const count = sampleCount(axis);
  const durationS = count > 1 ? timeAt(axis, count - 1) - timeAt(axis, 0) : 0;
  const near = (level: number, reach: number) => {
    let within = 0;
    for (let i = 0; i < sorted.length; i += 1) if (Math.abs(sorted[i]! - level) <= reach) within += 1;
    return within / sorted.length;
  };
  const atLevels = states
    ? near(states.low, 0.08 * (states.high - states.low)) +
      near(states.high, 0.08 * (states.high - states.low))
    : 0;
  const aboveHalf = sorted.length - sorted.findIndex((value) => value >= lowest + span / 2);
  return {
    lowest,
    highest,
    median,
    noise,
    flat,
    twoLevels: !flat && states !== null && states.bimodality > 0.9 && (holds || atLevels > 0.85),
    highShare: states?.highShare ?? 0,
    aboutZero:
      q(0.01) < 0 &&
      q(0.99) > 0 &&
      Math.abs(q(0.01) + q(0.99)) < 0.45 * wide &&
      Math.abs(median) < 0.25 * wide,
    swings: Math.floor(found / 2),
    swingRateHz: durationS > 0 ? found / 2 / durationS : 0,
    kickRatio: (highest - q(0.01)) / Math.max(q(0.9) - q(0.01), 1e-9 * Math.max(1, span)),
    topShare: aboveHalf / sorted.length,
    zeroShare: near(0, 0.04 * span),
  };
}
