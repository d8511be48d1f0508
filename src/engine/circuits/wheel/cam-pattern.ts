import { median } from '../../signal/statistics.ts';
import type { Pattern, PatternResult } from './pattern.ts';
import { openingEvent, repeatedPattern } from './repeated-pattern.ts';

/** How far (in crank teeth) a cam edge may move from cycle to cycle. */
const TOLERANCE = 0.45;
/** Share of the cam's cycles that must have the same number of crank teeth. */
const SHARE = 0.7;
const MOST_EDGES = 12;

/**
 * Counts the teeth of a wheel without a gap against a cam signal, which comes round once in two turns: the smallest
 * even number of teeth after which the cam's edges come back. `camTimes` are edges of one direction. Only the longest
 * stretch in which crank and cam stay together is used.
 */
export function findCamPattern(times: Float64Array, camTimes: Float64Array): PatternResult {
  const at = placesAmong(times, camTimes);
  for (let edges = 1; edges <= Math.min(MOST_EDGES, at.length - 2); edges += 1) {
    const cycles = at.slice(edges).map((place, k) => place - at[k]!);
    const cycle = Math.round(median(cycles)!);
    const fits = cycles.map((length) => Math.abs(length - cycle) <= TOLERANCE);
    if (fits.filter(Boolean).length < SHARE * cycles.length) continue;
    const run = longestRun(fits);
    // Two cycles of a cam with several edges; three edges of a cam with one, which has no shape to know it by.
    if (run.length < 2) continue;
    const steps = at.slice(run.from + 1, run.from + 1 + edges).map((place, k) => place - at[run.from + k]!);
    if (edges > 1 && Math.max(...steps) - Math.min(...steps) <= 2 * TOLERANCE) continue;
    if (cycle % 2 !== 0 || cycle < 4) return no('the cam comes back after an odd number of crank teeth');
    const from = Math.ceil(at[run.from]!);
    const to = Math.floor(at[run.from + run.length - 1 + edges]!) + 1;
    return counted(times.subarray(from, to), from, cycle / 2);
  }
  return no('the cam signal does not come back regularly enough to count them');
}

const no = (why: string): PatternResult => ({
  ok: false,
  reason: `the crank teeth alone do not show a turn, and ${why}`,
  evenly: true,
});

function counted(times: Float64Array, from: number, teeth: number): PatternResult {
  const intervals = Float64Array.from({ length: times.length - 1 }, (_, k) => times[k + 1]! - times[k]!);
  const shaped = shapedIntervals(intervals, teeth);
  const opening = shaped ? openingEvent(intervals, teeth) : { first: 0, several: true };
  const found = repeatedPattern(times, teeth, opening.first, opening.several);
  if (!found) return no('fewer than two turns are in the capture');
  const pattern: Pattern = { ...found, events: found.events.map((event) => event + from) };
  // Evenly spaced teeth: counted, but nothing marks the turn.
  return {
    ok: true,
    pattern: shaped ? pattern : { ...pattern, marks: new Int32Array(0), turns: new Int32Array(0) },
  };
}

function placesAmong(times: Float64Array, edges: Float64Array): number[] {
  const out: number[] = [];
  let k = 0;
  for (const edge of edges) {
    while (k + 1 < times.length && times[k + 1]! <= edge) k += 1;
    if (edge < times[0]! || k + 1 >= times.length) continue;
    out.push(k + (edge - times[k]!) / (times[k + 1]! - times[k]!));
  }
  return out;
}

function longestRun(fits: readonly boolean[]): { from: number; length: number } {
  let best = { from: 0, length: 0 };
  let length = 0;
  fits.forEach((fit, k) => {
    length = fit ? length + 1 : 0;
    if (length > best.length) best = { from: k - length + 1, length };
  });
  return best;
}

/** True when some tooth stands off an even division by a fifth of a place or more. */
function shapedIntervals(intervals: Float64Array, teeth: number): boolean {
  const sums = new Float64Array(teeth);
  const counts = new Float64Array(teeth);
  for (let k = 0; k + teeth <= intervals.length; k += 1) {
    let turn = 0;
    for (let i = 0; i < teeth; i += 1) turn += intervals[k + i]!;
    sums[k % teeth]! += (intervals[k]! * teeth) / turn;
    counts[k % teeth]! += 1;
  }
  return Array.from(sums).some((sum, tooth) => Math.abs(sum / Math.max(1, counts[tooth]!) - 1) > 0.2);
}
