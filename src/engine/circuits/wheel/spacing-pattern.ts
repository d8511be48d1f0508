import type { PatternResult } from './pattern.ts';
import { openingEvent, repeatedPattern } from './repeated-pattern.ts';

const MOST_TEETH = 48;
/** Logarithmic scatter of one tooth's share of the turn, from turn to turn, and as a part of the wheel's own variation. */
const MOST_SCATTER = 0.12;
const MOST_SHARE = 0.35;
/** Neighbouring intervals must differ at least so much: compression alone makes up to 1.45 on a wheel with few teeth. */
const LEAST_RATIO = 1.45;
/** Likeness (correlation) of each turn with the next. */
const LEAST_LIKENESS = 0.9;
/** Likeness of the two halves of a turn (correlation) above which the true turn may be half as long. */
const HALF_LIKENESS = 0.3;

/**
 * Finds a wheel whose teeth stand at unequal angles by the sequence of intervals coming back: each interval, as a share
 * of the turn about it, must be the same one turn later. Swings of speed from compression also come back, every
 * 720 / cylinders degrees, so a pattern is named only when it is far larger than such swings and when its two halves are
 * unlike: otherwise only a cam signal can tell how many teeth make a turn.
 */
export function findSpacingPattern(times: Float64Array): PatternResult {
  const intervals = Float64Array.from(
    { length: Math.max(0, times.length - 1) },
    (_, k) => times[k + 1]! - times[k]!,
  );
  for (let teeth = FEWEST; teeth <= Math.min(MOST_TEETH, Math.floor(intervals.length / 2)); teeth += 1) {
    const shares = sharesOfTurn(intervals, teeth);
    // Two turns are needed for a repetition, a third to prove that it was one.
    if (shares.length < 2 * teeth + 1) break;
    if (largestStep(shares) < Math.log(LEAST_RATIO)) continue;
    const variation = deviation(shares);
    const scatter = laggedDeviation(shares, teeth);
    if (scatter > MOST_SCATTER || scatter > MOST_SHARE * variation) continue;
    if (correlation(shares, teeth) < LEAST_LIKENESS || !stepsComeBack(shares, teeth)) continue;
    if (teeth === 2 || (teeth % 2 === 0 && correlation(shares, teeth / 2) > HALF_LIKENESS)) {
      return no(
        `the spacing comes back every ${teeth} teeth, but that may be half a turn, a turn or two: a cam signal beside it tells`,
      );
    }
    const { first, several } = openingEvent(intervals, teeth);
    const pattern = repeatedPattern(times, teeth, first, several);
    if (pattern) return { ok: true, pattern };
  }
  return no('no repeating pattern of teeth in the capture');
}

const FEWEST = 2;
const no = (reason: string): PatternResult => ({ ok: false, reason, evenly: false });

/** Logarithm of each interval over the mean interval of the turn centred on it: free of the mean speed. */
function sharesOfTurn(intervals: Float64Array, teeth: number): Float64Array {
  const before = teeth >> 1;
  const count = intervals.length - teeth + 1;
  const out = new Float64Array(Math.max(0, count));
  let sum = 0;
  for (let k = 0; k < teeth; k += 1) sum += intervals[k]!;
  for (let k = 0; k < count; k += 1) {
    if (k > 0) sum += intervals[k + teeth - 1]! - intervals[k - 1]!;
    out[k] = Math.log((intervals[k + before]! * teeth) / sum);
  }
  return out;
}

function largestStep(shares: Float64Array): number {
  const steps = new Float64Array(Math.max(0, shares.length - 1));
  for (let k = 1; k < shares.length; k += 1) steps[k - 1] = Math.abs(shares[k]! - shares[k - 1]!);
  // Every turn must show such a step; one odd interval must not.
  return steps.sort()[Math.max(0, Math.floor(steps.length * (1 - 1 / MOST_TEETH)) - 1)] ?? 0;
}

/** Every large step from interval to interval must be there again one turn on. */
function stepsComeBack(shares: Float64Array, teeth: number): boolean {
  const large = Math.log(LEAST_RATIO);
  let matched = 0;
  let missed = 0;
  for (let k = 1; k + teeth < shares.length; k += 1) {
    const here = shares[k]! - shares[k - 1]!;
    const there = shares[k + teeth]! - shares[k + teeth - 1]!;
    if (Math.max(Math.abs(here), Math.abs(there)) < large) continue;
    if (Math.sign(here) === Math.sign(there) && Math.abs(here - there) < 0.5 * large) matched += 1;
    else missed += 1;
  }
  return matched >= 2 && missed <= 0.2 * matched;
}

function deviation(values: Float64Array): number {
  let sum = 0;
  let squares = 0;
  for (const value of values) {
    sum += value;
    squares += value * value;
  }
  return Math.sqrt(Math.max(0, squares / values.length - (sum / values.length) ** 2));
}

function laggedDeviation(values: Float64Array, lag: number): number {
  let squares = 0;
  for (let k = 0; k + lag < values.length; k += 1) squares += (values[k + lag]! - values[k]!) ** 2;
  return Math.sqrt(squares / Math.max(1, values.length - lag) / 2);
}

function correlation(values: Float64Array, lag: number): number {
  let product = 0;
  let squares = 0;
  for (let k = 0; k + lag < values.length; k += 1) {
    product += values[k]! * values[k + lag]!;
    squares += (values[k]! ** 2 + values[k + lag]! ** 2) / 2;
  }
  return squares > 0 ? product / squares : 0;
}
