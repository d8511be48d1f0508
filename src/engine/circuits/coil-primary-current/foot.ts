import type { ExponentialFit } from '../../signal/exponential-fit.ts';
import { fitLine } from '../../signal/line-fit.ts';
import { rangeMean } from '../../signal/range.ts';
import { indexAtOrAfter, timeAt } from '../../signal/time.ts';
import type { CurrentTrace } from './trace.ts';

/** Where the trace itself leaves zero: the passage of 4 % of the peak just before the first sample with current. */
export function footOf(trace: CurrentTrace, first: number, peak: number): number {
  const { amperes, axis } = trace;
  const before = amperes[first - 1]!;
  const here = amperes[first]!;
  const level = Math.min(here, 0.04 * peak);
  const share = here > before ? Math.min(1, Math.max(0, (level - before) / (here - before))) : 1;
  return timeAt(axis, first - 1 + share);
}

/**
 * Amperes that appear at once, of the peak's share, where the curve drawn back meets zero well before the trace leaves it; else 0.
 * With noise the first sample that is above zero for sure comes late as well: then the samples before it already follow the curve.
 */
export function stepOf(
  { amperes, axis }: CurrentTrace,
  fit: ExponentialFit,
  originS: number,
  footS: number,
  peak: number,
  lengthS: number,
): number {
  const zeroS = fit.zeroS === null ? Number.NEGATIVE_INFINITY : originS + fit.zeroS;
  const step = Math.max(0, fit.at(footS - originS) / peak);
  if (step <= 0.12 || footS - zeroS <= 0.05 * lengthS) return 0;
  const from = indexAtOrAfter(axis, Math.max(zeroS, footS - 0.3 * lengthS));
  const to = indexAtOrAfter(axis, footS) - 1;
  const seen = rangeMean(amperes, from, to);
  if (seen === null) return step;
  const expected = (fit.at(timeAt(axis, from) - originS) + fit.at(timeAt(axis, to - 1) - originS)) / 2;
  return seen < 0.5 * expected ? step : 0;
}

/** Zero of a straight line through the first fifth of the rise; the foot where that makes no sense. */
export function startOfLine(trace: CurrentTrace, from: number, to: number, footS: number): number {
  const line = fitLine(trace.amperes, trace.axis, from, from + Math.max(4, 0.2 * (to - from)));
  if (!line || !(line.slope > 0)) return footS;
  const zeroS = line.middleS - line.middle / line.slope;
  return Math.abs(zeroS - footS) < 0.15 * (timeAt(trace.axis, to) - footS) ? zeroS : footS;
}
