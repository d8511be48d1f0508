import type { PatternResult } from './pattern.ts';
import { openingEvent, repeatedPattern } from './repeated-pattern.ts';

/** How far (in crank teeth) a cam edge may move from cycle to cycle. */
const TOLERANCE = 0.45;

/**
 * Counts the teeth of a wheel without a gap against a cam signal, which comes round once in two turns: the smallest
 * even number of teeth after which the cam's edges come back. `camTimes` are edges of one direction.
 */
export function findCamPattern(times: Float64Array, camTimes: Float64Array): PatternResult {
  const at = camTimes.length > 0 ? placesAmong(times, camTimes) : [];
  const steps = at.slice(1).map((place, k) => place - at[k]!);
  for (let edges = 1; edges <= Math.min(12, steps.length); edges += 1) {
    // Two cycles of a cam with several edges; three of a cam with a single one, which has no shape to know it by.
    if (at.length <= (edges === 1 ? 2 : edges + 1)) break;
    const cycles = at.slice(edges).map((place, k) => place - at[k]!);
    const mean = cycles.reduce((sum, cycle) => sum + cycle, 0) / cycles.length;
    const cycle = Math.round(mean);
    if (cycles.some((length) => Math.abs(length - cycle) > TOLERANCE)) continue;
    if (edges > 1 && !unlikeSteps(steps.slice(0, edges))) continue;
    if (cycle % 2 !== 0 || cycle < 4) {
      return no(
        'crank and cam do not come round together: the cam repeats after an odd number of crank teeth',
      );
    }
    const teeth = cycle / 2;
    const intervals = Float64Array.from({ length: times.length - 1 }, (_, k) => times[k + 1]! - times[k]!);
    const shaped = shapedIntervals(intervals, teeth);
    const opening = shaped ? openingEvent(intervals, teeth) : { first: 0, several: true };
    const pattern = repeatedPattern(times, teeth, opening.first, opening.several);
    if (!pattern) return no('fewer than two turns in the capture');
    // Evenly spaced teeth: counted, but nothing marks the turn.
    return shaped
      ? { ok: true, pattern }
      : { ok: true, pattern: { ...pattern, marks: new Int32Array(0), turns: new Int32Array(0) } };
  }
  return no(
    'evenly spaced teeth without a gap, and the cam signal does not come back often enough to count them',
  );
}

const no = (reason: string): PatternResult => ({ ok: false, reason, evenly: true });

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

const unlikeSteps = (steps: number[]) => Math.max(...steps) - Math.min(...steps) > 2 * TOLERANCE;

/** True when some tooth stands off an even division by a fifth of a place or more. */
function shapedIntervals(intervals: Float64Array, teeth: number): boolean {
  const sums = new Float64Array(teeth);
  for (let k = 0; k + teeth <= intervals.length; k += 1) {
    let turn = 0;
    for (let i = 0; i < teeth; i += 1) turn += intervals[k + i]!;
    sums[k % teeth]! += (intervals[k]! * teeth) / turn;
  }
  const counts = Math.max(1, Math.floor((intervals.length - teeth + 1) / teeth));
  return Array.from(sums).some((sum) => Math.abs(sum / counts - 1) > 0.2);
}
