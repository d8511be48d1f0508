import { fullestLevel, within } from '../../signal/fullest-level.ts';
import { sortedRange } from '../../signal/range.ts';
import { readingNoise } from '../../signal/resolution.ts';
import { quantileSorted } from '../../signal/statistics.ts';

/**
 * The two states of a load that a driver switches to ground: `rest` with the driver off (the feed seen through the
 * load), `on` with the driver on; null when the trace never goes there. Volts as measured.
 */
export interface LoadStates {
  readonly rest: number;
  readonly on: number | null;
  /** Noise of the reading (white or quantisation), rms. */
  readonly noise: number;
  /** Rest level near zero with the on level as far below it: the input blocks direct voltage. */
  readonly acCoupled: boolean;
}

/**
 * Rest and on level from the histogram of the trace without its rare extremes (kicks). The rest level is the fullest
 * mode, except when that mode is the on level itself: then something far above it is full as well and nothing is below.
 * Kicks, burn lines and rings are above or below for shorter times. All samples holes: null.
 */
export function loadStates(values: Float32Array): LoadStates | null {
  const sorted = sortedRange(values, 0, values.length, 65_536);
  if (sorted.length < 8) return null;
  const noise = readingNoise(values);
  const bottom = quantileSorted(sorted, 0.0005);
  const top = quantileSorted(sorted, 0.98);
  const full = fullestLevel(sorted, bottom, top, noise);
  const above = fullestLevel(sorted, full.level + Math.max(6 * noise, 0.04 * (top - bottom)), top, noise);
  const step = above.level - full.level;
  const below = shareBetween(sorted, Number.NEGATIVE_INFINITY, full.level - 0.3 * step);
  const fullIsOn =
    above.share >= 0.05 && step > 0 && full.level < 0.35 * above.level && below < 0.5 * above.share;
  const rest = fullIsOn ? above.level : full.level;

  const grounded = rest > 0 ? within(sorted, -0.2 * rest, 0.62 * rest) : sorted.subarray(0, 0);
  const enough = Math.max(3, sorted.length * 0.0002);
  if (rest > 6 * noise && grounded.length >= enough) {
    const on = fullestLevel(grounded, grounded[0]!, grounded[grounded.length - 1]!, noise).level;
    if (rest - on > Math.max(6 * noise, 0.3 * rest)) return { rest, on, noise, acCoupled: false };
  }
  const lower = within(sorted, bottom, rest - Math.max(8 * noise, 0.35 * (rest - bottom)));
  if (lower.length >= enough && Math.abs(rest) < 0.45 * (rest - bottom)) {
    const on = fullestLevel(lower, lower[0]!, lower[lower.length - 1]!, noise).level;
    if (Math.abs(rest) < 0.7 * (rest - on)) return { rest, on, noise, acCoupled: true };
  }
  return { rest, on: null, noise, acCoupled: false };
}

const shareBetween = (sorted: Float32Array, low: number, high: number) =>
  within(sorted, low, high).length / sorted.length;
