import { median } from '../../signal/statistics.ts';
import type { PatternResult } from './pattern.ts';
import { repeatedPattern } from './repeated-pattern.ts';

const FEWEST_TEETH = 6;
const MOST_TEETH = 80;
/** Wide pulses are at least this much longer than narrow ones; between the two there is an empty stretch. */
const LEAST_RATIO = 1.6;
/** Each width makes at least this share of the pulses: a gap is no wide pulse. */
const LEAST_SHARE = 0.2;

/**
 * Finds a wheel whose slots are told apart by wide and narrow pulses (24 slots, each edge of one kind 15 degrees apart):
 * the sequence of wide and narrow must come back. `widths[k]` is the share of interval k that the pulse takes.
 */
export function findWidthPattern(times: Float64Array, widths: Float64Array): PatternResult {
  const sorted = Float64Array.from(widths).sort();
  let split = Number.NaN;
  let widest = LEAST_RATIO;
  for (let k = 1; k < sorted.length; k += 1) {
    const ratio = sorted[k]! / sorted[k - 1]!;
    if (ratio > widest) {
      widest = ratio;
      split = (sorted[k]! + sorted[k - 1]!) / 2;
    }
  }
  if (Number.isNaN(split)) return no('the pulses are all of one width');
  const wide = Uint8Array.from(widths, (width) => (width > split ? 1 : 0));
  const narrowMiddle = median(widths.filter((width) => width <= split))!;
  const wideMiddle = median(widths.filter((width) => width > split))!;
  if (wideMiddle < LEAST_RATIO * narrowMiddle) return no('the pulses are all of one width');

  const wides = wide.reduce((sum, w) => sum + w, 0);
  if (Math.min(wides, wide.length - wides) < LEAST_SHARE * wide.length)
    return no('the pulses are all of one width');

  for (let teeth = FEWEST_TEETH; teeth <= MOST_TEETH; teeth += 1) {
    const overlap = wide.length - teeth;
    if (overlap < Math.max(10, teeth / 2)) break;
    let unlike = 0;
    for (let k = 0; k < overlap; k += 1) if (wide[k] !== wide[k + teeth]) unlike += 1;
    if (unlike > 0.02 * overlap) continue;
    const first = afterLongestRun(wide, teeth);
    const pattern = repeatedPattern(times, teeth, first.first, first.several);
    if (pattern) return { ok: true, pattern };
  }
  return no('wide and narrow pulses do not come back in a repeating pattern');
}

const no = (reason: string): PatternResult => ({ ok: false, reason, evenly: false });

/** The event after the longest run of one width within the turn. */
function afterLongestRun(wide: Uint8Array, teeth: number): { first: number; several: boolean } {
  const runs: Array<{ end: number; length: number }> = [];
  let length = 0;
  for (let k = 1; k <= 2 * teeth; k += 1) {
    length += 1;
    if (wide[k % teeth] !== wide[(k - 1) % teeth]) {
      if (k > teeth) runs.push({ end: k % teeth, length: Math.min(length, teeth) });
      length = 0;
    }
  }
  const longest = Math.max(...runs.map((run) => run.length));
  const ends = runs.filter((run) => run.length === longest).map((run) => run.end);
  return { first: Math.min(...ends), several: ends.length > 1 };
}
