import { type EvenMeans, evenMeans, movingMean } from '../../signal/even-means.ts';
import { findPeaks } from '../../signal/peaks.ts';
import { spectrum, strongestIn } from '../../signal/spectrum.ts';
import { median } from '../../signal/statistics.ts';
import type { MeasuredSignal } from '../types.ts';

/** Ripples a second of pumps from slow to fast. Common practice, no source. */
const LOWEST_HZ = 80;
const HIGHEST_HZ = 4000;
/** Two ways to the rate must agree within this share. */
const AGREE = 0.05;
/** Below this a fast pump's ripple folds back to a slower one that looks as real. Ripples are some 300 to 1,500 a second: common practice, no source. */
const LEAST_RATE_HZ = 4000;
const MOST_POINTS = 1 << 17;

export type Ripple =
  | { readonly rateHz: number; readonly fromS: number; readonly toS: number }
  | { readonly rateHz: null; readonly reason: string };

/** Commutator ripple of a running pump from the spectrum, checked by the distance of its peaks. */
export function findRipple({ values, axis }: MeasuredSignal): Ripple {
  const means = evenMeans(values, axis, 1 / (8 * HIGHEST_HZ));
  if (!means) return { rateHz: null, reason: 'no samples to measure' };
  const rateHz = 1 / means.stepS;
  if (rateHz < LEAST_RATE_HZ)
    return {
      rateHz: null,
      reason: `${Math.round(rateHz)} samples a second are too few for the ripple; 10,000 would do`,
    };
  const part = running(means);
  if (part.length * means.stepS < 12 / LOWEST_HZ)
    return { rateHz: null, reason: 'the pump runs too short a time in the capture' };
  const slow = movingMean(part, 1.5 / (LOWEST_HZ * means.stepS));
  const fast = part.map((value, i) => value - slow[i]!);
  const found = spectrum(fast, { sampleRateHz: rateHz, padding: 2 });
  const peak = found && strongestIn(found, LOWEST_HZ, Math.min(HIGHEST_HZ, 0.4 * rateHz));
  if (!peak || peak.prominence < 10) return { rateHz: null, reason: 'no ripple stands out' };
  const period = 1 / (peak.frequencyHz * means.stepS);
  const smooth = movingMean(fast, period / 4);
  const places = findPeaks(smooth, { distance: 0.5 * period, prominence: 0.5 * peak.amplitude }).map(
    (one) => one.index,
  );
  const apart = median(places.slice(1).map((at, k) => at - places[k]!));
  const tolerance = Math.max(AGREE * period, 1);
  if (apart === null || Math.abs(apart - period) > tolerance)
    return { rateHz: null, reason: 'spectrum and ripple peaks do not agree' };
  return {
    rateHz: peak.frequencyHz,
    fromS: means.startS,
    toS: means.startS + (means.values.length - 1) * means.stepS,
  };
}

/** Longest stretch near the usual current, at most 131,072 steps. */
function running({ values }: EvenMeans): Float64Array {
  const level = median(values.filter((value) => Math.abs(value) > 0.3)) ?? 0;
  let best: readonly [number, number] = [0, 0];
  let from = 0;
  for (let i = 0; i <= values.length; i += 1) {
    const runs = i < values.length && values[i]! / level > 0.4 && values[i]! / level < 2;
    if (!runs) {
      if (i - from > best[1] - best[0]) best = [from, i];
      from = i + 1;
    }
  }
  return values.slice(best[0], Math.min(best[1], best[0] + MOST_POINTS));
}
