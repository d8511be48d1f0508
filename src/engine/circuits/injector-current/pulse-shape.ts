import { movingMean } from '../../signal/even-means.ts';
import { rangeMedian } from '../../signal/range.ts';
import { timeAt } from '../../signal/time.ts';
import type { Charge } from '../coil-primary-current/charges.ts';
import type { CurrentTrace } from '../coil-primary-current/trace.ts';
import { partOf } from '../events/part-of.ts';
import { findHump } from '../injector-voltage/hump.ts';

export interface InjectorCurrentPulse {
  readonly startS: number | null;
  readonly endS: number;
  /** Highest mean of five samples, and its time. */
  readonly peak: number;
  readonly peakS: number;
  /** Level of the last third, where it is less than 70 % of the peak. */
  readonly hold: number | null;
  /** Time of the dent that the moving needle leaves in the rise. */
  readonly dentS: number | null;
}

export function pulseShape(trace: CurrentTrace, charge: Charge): InjectorCurrentPulse {
  const { amperes, axis, noise } = trace;
  const from = charge.first ?? 0;
  const { last } = charge;
  const smooth = movingMean(Float64Array.from(amperes.subarray(from, last + 1)), 5);
  let top = 0;
  for (let i = 1; i < smooth.length; i += 1) if (smooth[i]! > smooth[top]!) top = i;
  const peak = smooth[top]!;
  const tail = rangeMedian(amperes, last - 0.33 * (last - from), last + 1);
  const rise = from + top;
  const mirrored = amperes.subarray(from, rise + 1).map((value) => -value);
  const axisPart = partOf(axis, from, mirrored.length);
  const dent = charge.first === null ? null : findHump(mirrored, axisPart, 0, mirrored.length, -peak, noise);
  return {
    startS: charge.first === null ? null : timeAt(axis, charge.first),
    endS: timeAt(axis, last),
    peak,
    peakS: timeAt(axis, rise),
    hold: tail !== null && tail < 0.7 * peak ? tail : null,
    dentS: dent?.atS ?? null,
  };
}
