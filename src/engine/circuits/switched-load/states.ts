import { crossings } from '../../signal/crossings.ts';
import { type FullestLevel, fullestLevel, within } from '../../signal/fullest-level.ts';
import { rangeMedian, sortedRange } from '../../signal/range.ts';
import { quantisationStep, readingNoise } from '../../signal/resolution.ts';
import { median, quantileSorted } from '../../signal/statistics.ts';

/**
 * The two states of a load that a driver switches to ground: `rest` with the driver off (the feed seen through the
 * load), `on` with the driver on; null when the trace never goes there. Volts as measured.
 */
export interface LoadStates {
  readonly rest: number;
  readonly on: number | null;
  /** Noise of the reading (white or quantisation), rms. */
  readonly noise: number;
  /** Step of the converter; 0 where none is seen. */
  readonly step: number;
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
  const converterStep = quantisationStep(values);
  const bottom = quantileSorted(sorted, 0.0005);
  const top = quantileSorted(sorted, 0.98);
  const full = fullestLevel(sorted, bottom, top, noise);
  // Past the slope of the on level, short of the feed; rings and kicks are too rare to widen these quantiles.
  const usual = quantileSorted(sorted, 0.9) - quantileSorted(sorted, 0.1);
  const above = fullestLevel(sorted, full.level + Math.max(6 * noise, 0.15 * usual), top, noise);
  const step = above.level - full.level;
  const below = shareBetween(sorted, Number.NEGATIVE_INFINITY, full.level - 0.3 * step);
  const fullIsOn =
    above.share >= 0.05 && step > 0 && full.level < 0.35 * above.level && below < 0.5 * above.share;
  const fullest = fullIsOn ? above : full;
  const rest = lowerRest(values, sorted, fullest, noise) ?? fullest.level;

  const grounded = rest > 0 ? within(sorted, -0.2 * rest, 0.62 * rest) : sorted.subarray(0, 0);
  const enough = Math.max(3, sorted.length * 0.0002);
  if (rest > 5 * noise && grounded.length >= enough) {
    const on = fullestLevel(grounded, grounded[0]!, grounded[grounded.length - 1]!, noise).level;
    if (rest - on > Math.max(4 * noise, 0.3 * rest))
      return { rest, on, noise, step: converterStep, acCoupled: false };
  }
  const lower = within(sorted, bottom, rest - Math.max(8 * noise, 0.35 * (rest - bottom)));
  if (lower.length >= enough && Math.abs(rest) < 0.45 * (rest - bottom)) {
    const on = fullestLevel(lower, lower[0]!, lower[lower.length - 1]!, noise).level;
    if (Math.abs(rest) < 0.7 * (rest - on)) return { rest, on, noise, step: converterStep, acCoupled: true };
  }
  return { rest, on: null, noise, step: converterStep, acCoupled: false };
}

/**
 * In a short capture a burn line can be fuller than the rest level below it. A lower full level is the rest level when the
 * driver comes on from it (or, where that is not in the capture, when the capture ends at it); else null.
 */
function lowerRest(
  values: Float32Array,
  sorted: Float32Array,
  fullest: FullestLevel,
  noise: number,
): number | null {
  const high = 0.72 * fullest.level;
  const low = Math.max(0.12 * fullest.level, 4 * noise);
  if (!(high > low)) return null;
  const candidate = fullestLevel(sorted, low, high, noise);
  if (candidate.level < low || candidate.share < 0.2 * fullest.share) return null;
  const below = within(sorted, -0.2 * candidate.level, 0.62 * candidate.level);
  if (below.length < Math.max(3, 0.01 * candidate.share * sorted.length)) return null;
  const on = fullestLevel(below, below[0]!, below[below.length - 1]!, noise).level;
  if (candidate.level - on < Math.max(4 * noise, 0.3 * candidate.level)) return null;
  const apart = candidate.level - on;
  const about = (level: number) => shareBetween(sorted, level - 0.15 * apart, level + 0.15 * apart);
  if (about((candidate.level + on) / 2) > 0.4 * about(candidate.level)) return null;
  const before = levelBeforeOn(values, on, candidate.level);
  const seen = before ?? rangeMedian(values, 0.95 * values.length, values.length);
  return seen !== null && Math.abs(seen - candidate.level) < 0.25 * candidate.level ? candidate.level : null;
}

/** Median level of the 40 samples before the long stretches near `on` begin; null where no beginning is seen. */
function levelBeforeOn(values: Float32Array, on: number, rest: number): number | null {
  const found = crossings(values, { level: (on + rest) / 2, hysteresis: 0.4 * (rest - on) });
  const stretches: Array<{ from: number; length: number }> = [];
  for (let k = 0; k < found.count; k += 1) {
    if (found.rising[k] === 1) continue;
    stretches.push({ from: found.at[k]!, length: (found.at[k + 1] ?? values.length) - found.at[k]! });
  }
  const longest = Math.max(0, ...stretches.slice(0, 10_000).map((one) => one.length));
  const levels = stretches
    .filter((one) => one.length >= 0.4 * longest)
    .slice(0, 200)
    .map(({ from }) => rangeMedian(values, from - 40, from - 1));
  return median(levels.filter((level) => level !== null));
}

const shareBetween = (sorted: Float32Array, low: number, high: number) =>
  within(sorted, low, high).length / sorted.length;
