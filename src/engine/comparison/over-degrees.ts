import type { Wheel } from '../capture.ts';
import { sampleAtTime } from './sample-at-time.ts';
import type { Side } from './types.ts';

/** Angles of the wheel's tooth events that the capture covers. */
export function coveredDeg(wheel: Wheel): { readonly from: number; readonly to: number } {
  return { from: wheel.teethDeg[0] ?? 0, to: wheel.teethDeg.at(-1) ?? 0 };
}

const BREAK_DEGREES = 300;

/** Time of a crank angle (unwrapped, 0 at the first reference mark), on straight lines between tooth events; null outside of them and across a
 * break in which the teeth could not be followed (a step of 300 degrees or more). */
export function timeAtDegree(wheel: Wheel, deg: number): number | null {
  const angles = wheel.teethDeg;
  let low = 0;
  let high = angles.length - 1;
  if (high < 1 || deg < angles[0]! || deg > angles[high]!) return null;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (angles[middle]! <= deg) low = middle;
    else high = middle;
  }
  const step = angles[high]! - angles[low]!;
  if (step >= BREAK_DEGREES) return null;
  const share = (deg - angles[low]!) / step;
  return wheel.teethS[low]! + share * (wheel.teethS[high]! - wheel.teethS[low]!);
}

/** Most cycles that are averaged: more only costs time. */
const MOST_CYCLES = 8;

/**
 * The signal over `spanDeg` crank degrees from `originDeg` on in equal steps: mean over the complete cycles, at most eight.
 * When no cycle is complete, what is there of the first. NaN where no sample lies.
 */
export function overDegrees(
  side: Side,
  wheel: Wheel,
  originDeg: number,
  spanDeg: number,
  stepDeg: number,
): Float64Array {
  const count = Math.round(spanDeg / stepDeg) + 1;
  const sums = new Float64Array(count);
  const counts = new Uint16Array(count);
  const covered = coveredDeg(wheel);
  const first = Math.ceil((covered.from - originDeg) / spanDeg - 1e-9);
  const last = Math.floor((covered.to - originDeg) / spanDeg + 1e-9) - 1;
  const complete = last >= first;
  const from = complete ? first : first - 1;
  const to = complete ? Math.min(last, first + MOST_CYCLES - 1) : first;
  for (let cycle = from; cycle <= to; cycle++) {
    for (let i = 0; i < count; i++) {
      const time = timeAtDegree(wheel, originDeg + cycle * spanDeg + i * stepDeg);
      if (time === null) continue;
      const value = sampleAtTime(side, time);
      if (Number.isNaN(value)) continue;
      sums[i]! += value;
      counts[i]! += 1;
    }
  }
  return sums.map((sum, i) => (counts[i]! > 0 ? sum / counts[i]! : Number.NaN));
}
