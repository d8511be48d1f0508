import { type ExponentialFit, fitExponential } from '../../signal/exponential-fit.ts';
import { fitLine } from '../../signal/line-fit.ts';
import { rangeMean, rangeMedian } from '../../signal/range.ts';
import { robustDeviation } from '../../signal/statistics.ts';
import { timeAt } from '../../signal/time.ts';
import { partOf } from '../events/part-of.ts';
import type { Charge } from './charges.ts';
import { footOf, startOfLine, stepOf } from './foot.ts';
import type { CurrentTrace } from './trace.ts';

/** What the curve of one charge says. Times in seconds of the capture. */
export interface ChargeShape {
  readonly charge: Charge;
  /** Where the fitted rise meets zero, or the foot of a step; null when the start is not in the capture. */
  readonly startS: number | null;
  readonly endS: number;
  readonly peak: number;
  /** The last 10 % of the dwell stay within 1 %. */
  readonly flat: boolean;
  /** Rise over the last 10 % of the dwell as a share of its level, and the standard error of that. */
  readonly drift: { readonly share: number; readonly error: number } | null;
  /** Flat although the rise, drawn on, would have gone well above: a limiter and not the end of the L/R curve. */
  readonly limiter: boolean;
  readonly timeConstantS: number | null;
  /** Amperes that appear at once at the start, of the peak's share; 0 without a step. */
  readonly step: number;
  /** The curve bends upwards: the core saturates. */
  readonly bendsUp: boolean;
}

const MOST_POINTS = 600;

/**
 * i = I∞ (1 − e^(−t/τ)) fitted to the rise of one charge (to the part before the flat when the current is held). Where
 * the curve does not follow that law, its ends are read from straight lines through the first fifth and the last tenth.
 */
export function chargeShape(trace: CurrentTrace, charge: Charge): ChargeShape {
  const { amperes, axis, noise } = trace;
  const from = charge.first ?? 0;
  const { last } = charge;
  const endS = timeAt(axis, last);
  const tailFrom = Math.ceil(last - 0.1 * (last - from));
  const tail = withoutOutliers(amperes.subarray(tailFrom, last + 1));
  const held = rangeMean(tail, 0, tail.length) ?? amperes[last]!;
  const slope = fitLine(tail, partOf(axis, tailFrom, tail.length), 0, tail.length);
  const tailS = endS - timeAt(axis, tailFrom);
  const drift = slope ? Math.abs(slope.slope) * tailS : Number.POSITIVE_INFINITY;
  const straight =
    drift < 0.01 * held || (slope !== null && drift < 0.015 * held && drift < 2 * slope.slopeError * tailS);
  const unsure = slope === null || slope.slopeError * tailS > 0.004 * held;
  const flat = straight || (unsure && heldBetter(trace, from, last, held));

  const to = flat ? kneeOf(amperes, from, last, 0.97 * held - 2 * noise) : last;
  const fit = fitPart(trace, from, to);
  const good = fit !== null && fit.residual < Math.max(2 * noise, 0.012 * held) && fit.slope > 0;
  const originS = timeAt(axis, from);
  const peak = flat
    ? held
    : good
      ? fit.at(endS - originS)
      : slope
        ? slope.middle + slope.slope * (endS - slope.middleS)
        : held;
  const footS = charge.first === null ? null : footOf(trace, charge.first, peak);
  const zeroS = good && fit.zeroS !== null ? originS + fit.zeroS : null;
  const lengthS = endS - originS;
  const step = footS === null || !good ? 0 : stepOf(trace, fit, originS, footS, peak, lengthS);
  // Neighbouring samples of a coarse converter err together: only as many count as steps are passed.
  const passed = trace.step > 0 ? Math.max(1, (2 * held) / trace.step) : Number.POSITIVE_INFINITY;
  const spread = Math.sqrt(Math.max(1, Math.min(to - from, MOST_POINTS) / passed));
  const sure =
    good &&
    fit.rate > 0 &&
    spread * fit.rateError < 0.07 * fit.rate &&
    fit.rate * (timeAt(axis, to) - originS) > 0.12;
  const coarse = trace.step > 0.03 * held && !sure;
  const startS = startOf();
  function startOf(): number | null {
    if (footS === null || coarse) return null;
    if (step > 0) return footS;
    if (zeroS !== null && Math.abs(zeroS - footS) <= 0.3 * lengthS) return zeroS;
    return startOfLine(trace, from, to, footS);
  }
  return {
    charge,
    startS,
    endS,
    peak,
    flat,
    drift:
      slope && held > 0
        ? { share: (slope.slope * tailS) / held, error: (slope.slopeError * tailS) / held }
        : null,
    limiter: flat && (!good || fit.final === null || fit.final > 1.15 * held),
    timeConstantS: sure ? 1 / fit.rate : null,
    step,
    bendsUp: fit !== null && !flat && fit.rate * lengthS < -0.3 && fit.rateError * lengthS < 0.15,
  };
}

/**
 * Where noise or few samples hide whether the last tenth is level: does a curve that ends in a flat follow the samples
 * clearly better than a curve alone? The flat must be at least 15 % of the dwell.
 */
function heldBetter(trace: CurrentTrace, from: number, last: number, held: number): boolean {
  const { amperes, noise } = trace;
  const knee = kneeOf(amperes, from, last, 0.97 * held - noise);
  if (last - knee < Math.max(3, 0.15 * (last - from)) || knee - from < 4) return false;
  const alone = fitPart(trace, from, last);
  const before = fitPart(trace, from, knee);
  if (!alone || !before) return false;
  let squares = 0;
  for (let i = knee + 1; i <= last; i += 1) squares += (amperes[i]! - held) ** 2;
  const both = Math.sqrt((before.residual ** 2 * (knee - from) + squares) / (last - from));
  return both < Math.min(0.93, 1 - 6 / (last - from)) * alone.residual;
}

/** First sample at or above `level`; the flat begins about there. */
function kneeOf(amperes: Float32Array, from: number, last: number, level: number): number {
  for (let i = Math.ceil(from); i < last; i += 1)
    if (amperes[i]! >= level) return Math.max(i - 1, Math.ceil(from) + 3);
  return last;
}

/** Fit over at most 600 means of neighbouring samples, times from sample `from` on; what lies far off is left out and the rest fitted again. */
function fitPart(trace: CurrentTrace, from: number, to: number): ExponentialFit | null {
  const { amperes, axis } = trace;
  const size = Math.max(1, Math.ceil((to - from + 1) / MOST_POINTS));
  const originS = timeAt(axis, from);
  const timesS: number[] = [];
  const means: number[] = [];
  for (let i = from; i + size - 1 <= to; i += size) {
    const value = size === 1 ? amperes[i]! : rangeMean(amperes, i, i + size);
    if (value === null || Number.isNaN(value)) continue;
    timesS.push(timeAt(axis, i + (size - 1) / 2) - originS);
    means.push(value);
  }
  const first = fitExponential(Float64Array.from(timesS), Float64Array.from(means));
  if (!first) return null;
  const off = timesS.map((timeS, k) => means[k]! - first.at(timeS));
  const reach =
    5 * Math.max(robustDeviation(off) ?? 0, 1e-6 * Math.abs(first.at(timesS[timesS.length - 1]!)));
  const kept = timesS.map((_, k) => k).filter((k) => Math.abs(off[k]!) <= reach);
  if (kept.length === timesS.length || kept.length < 0.8 * timesS.length) return first;
  return fitExponential(
    Float64Array.from(kept, (k) => timesS[k]!),
    Float64Array.from(kept, (k) => means[k]!),
  );
}

/** A copy in which what lies far from the rest (pick-up at the switch-off) is a hole. */
function withoutOutliers(values: Float32Array): Float32Array {
  const middle = rangeMedian(values, 0, values.length);
  const reach = 6 * (robustDeviation(values) ?? 0);
  if (middle === null || !(reach > 0)) return values;
  return values.map((value) => (Math.abs(value - middle) <= reach ? value : Number.NaN));
}
