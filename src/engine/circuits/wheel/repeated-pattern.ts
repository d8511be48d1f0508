import { mapped } from '../../signal/mapped.ts';
import type { Pattern } from './pattern.ts';

/**
 * Builds a pattern for teeth that stand unevenly (no equal places): `teeth` events make a turn, the first reference
 * mark is event `first`. Angles are each tooth's mean share of the turn, over all complete turns.
 */
export function repeatedPattern(
  times: Float64Array,
  teeth: number,
  first: number,
  several: boolean,
): Pattern | null {
  const start = ((first % teeth) + teeth) % teeth;
  const marks: number[] = [];
  for (let k = start; k < times.length; k += teeth) marks.push(k);
  if (marks.length < 2) return null;
  const shares = new Float64Array(teeth);
  for (let m = 0; m + 1 < marks.length; m += 1) {
    const from = times[marks[m]!]!;
    const length = times[marks[m + 1]!]! - from;
    for (let k = 0; k < teeth; k += 1) shares[k]! += (times[marks[m]! + k]! - from) / length;
  }
  const turns = marks.length - 1;
  const degrees = mapped(times, (_, k) => {
    const turn = Math.floor((k - start) / teeth);
    return 360 * (turn + shares[k - start - turn * teeth]! / turns);
  });
  return {
    name: String(teeth),
    places: null,
    teeth,
    missing: 0,
    gaps: [],
    events: Int32Array.from(times, (_, k) => k),
    degrees,
    marks: Int32Array.from(marks),
    turns: Int32Array.from(marks, (_, i) => i),
    stretches: [0],
    markIsFirstOfSeveral: several,
    doubled: [],
  };
}

/**
 * Which event opens the turn: the one after the longest interval, where one interval stands out by a tenth; else the
 * first in time that follows one of the longest.
 */
export function openingEvent(intervals: Float64Array, teeth: number): { first: number; several: boolean } {
  const sums = new Float64Array(teeth);
  const counts = new Float64Array(teeth);
  for (let k = 0; k < intervals.length; k += 1) {
    sums[k % teeth]! += intervals[k]!;
    counts[k % teeth]! += 1;
  }
  const means = Array.from(sums, (sum, k) => sum / Math.max(1, counts[k]!));
  const longest = Math.max(...means);
  const long = means.map((_, k) => k).filter((k) => means[k]! > longest / 1.1);
  return { first: long[0]! + 1, several: long.length > 1 };
}
