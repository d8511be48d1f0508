import { movingMean } from '../../signal/even-means.ts';
import { fitExponential } from '../../signal/exponential-fit.ts';
import { fitLine } from '../../signal/line-fit.ts';
import { highestIn, rangeMedian } from '../../signal/range.ts';
import { timeAt } from '../../signal/time.ts';
import type { Charge } from '../coil-primary-current/charges.ts';
import type { CurrentTrace } from '../coil-primary-current/trace.ts';
import { partOf } from '../events/part-of.ts';
import { findHump } from '../injector-voltage/hump.ts';

export interface InjectorCurrentPulse {
  /** Where the rise, drawn back, meets zero; null when the capture begins inside the pulse. */
  readonly startS: number | null;
  readonly endS: number;
  /** Highest current: the sample itself where noise is small, else a straight line through the last part of the rise. null: it lies between samples. */
  readonly peak: number | null;
  readonly peakS: number;
  /** Level of the last third, where it is less than 70 % of the peak. */
  readonly hold: number | null;
  /** Time of the dent that the moving needle leaves in the rise. */
  readonly dentS: number | null;
}

/** Noise below this share of the peak does not lift the highest sample by much more than that. */
const QUIET = 0.005;
/** A peak that stands this far above both of its neighbours lies between samples. */
const SHARP = 0.03;

export function pulseShape(trace: CurrentTrace, charge: Charge): InjectorCurrentPulse {
  const { amperes, axis, noise } = trace;
  const from = charge.first ?? 0;
  const { last } = charge;
  const smooth = movingMean(Float64Array.from(amperes.subarray(from, last + 1)), 5);
  let top = 0;
  for (let i = 1; i < smooth.length; i += 1) if (smooth[i]! > smooth[top]!) top = i;
  const quiet = noise < QUIET * smooth[top]!;
  const rise = quiet ? Math.max(from, highestIn(amperes, from, last + 1)) : from + top;
  const peak = quiet ? sampledPeak(amperes, rise, from, last) : fittedPeak(trace, from, rise, smooth[top]!);
  const height = peak ?? amperes[rise]!;
  const tail = rangeMedian(amperes, last - 0.33 * (last - from), last + 1);
  const mirrored = amperes.subarray(from, rise + 1).map((value) => -value);
  const axisPart = partOf(axis, from, mirrored.length);
  const dent =
    charge.first === null ? null : findHump(mirrored, axisPart, 0, mirrored.length, -height, noise);
  return {
    startS: charge.first === null ? null : startOf(trace, charge.first, rise, height),
    endS: timeAt(axis, last),
    peak,
    peakS: timeAt(axis, rise),
    hold: tail !== null && tail < 0.7 * height ? tail : null,
    dentS: dent?.atS ?? null,
  };
}

function sampledPeak(amperes: Float32Array, at: number, from: number, last: number): number | null {
  const peak = amperes[at]!;
  const stands = (neighbour: number | undefined) =>
    neighbour !== undefined && peak - neighbour > SHARP * peak;
  const inside = at > from && at < last;
  return inside && stands(amperes[at - 1]) && stands(amperes[at + 1]) ? null : peak;
}

function fittedPeak(trace: CurrentTrace, from: number, rise: number, smoothed: number): number | null {
  const highest = trace.amperes[highestIn(trace.amperes, from, rise + 3)]!;
  if (rise - from < 8 && highest > 1.05 * smoothed) return null;
  const width = Math.max(5, 0.15 * (rise - from));
  const line = fitLine(trace.amperes, trace.axis, rise - width, rise + 1);
  if (!line || rise - width < from) return smoothed;
  const drawn = line.middle + line.slope * (timeAt(trace.axis, rise) - line.middleS);
  return Math.max(smoothed, drawn);
}

/** Zero of an exponential fitted to the lower half of the rise; the first sample with current where that lies far from it. */
function startOf({ amperes, axis, noise }: CurrentTrace, first: number, rise: number, peak: number): number {
  const firstS = timeAt(axis, first);
  let to = first;
  while (to < rise && !(amperes[to]! > 0.5 * peak + noise)) to += 1;
  const timesS: number[] = [];
  const values: number[] = [];
  const step = Math.max(1, Math.floor((to - first) / 400));
  for (let i = first; i <= to; i += step) {
    if (Number.isNaN(amperes[i]!)) continue;
    timesS.push(timeAt(axis, i) - firstS);
    values.push(amperes[i]!);
  }
  const fit = fitExponential(Float64Array.from(timesS), Float64Array.from(values));
  const lengthS = timeAt(axis, to) - firstS;
  if (!fit || fit.zeroS === null || !(fit.slope > 0)) return firstS;
  // The first sample that is above zero for sure comes late by what 4 % of the peak or four times the noise take.
  const reach =
    lengthS * Math.min(0.6, 0.15 + (8 * noise) / peak) +
    (timeAt(axis, first) - timeAt(axis, Math.max(0, first - 1)));
  return Math.abs(fit.zeroS) <= reach ? firstS + fit.zeroS : firstS;
}
