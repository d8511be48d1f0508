import type { PlotWheel } from './types.ts';

/**
 * Seconds to crank degrees and back: straight between tooth events, as the engine measures angles. Degrees are unwrapped
 * (360 a turn, 0 at the first reference mark). Outside the tooth events the angle is not known: null.
 */
export function degreesAt(wheel: PlotWheel, timeS: number): number | null {
  return between(wheel.teethS, wheel.teethDeg, timeS);
}

export function timeAtDegrees(wheel: PlotWheel, degrees: number): number | null {
  return between(wheel.teethDeg, wheel.teethS, degrees);
}

/** Turn that holds the time, counted from 0 at the first reference mark; null outside the complete turns. */
export function turnAt(wheel: PlotWheel, timeS: number): number | null {
  const { marksS } = wheel;
  if (marksS.length < 2 || timeS < marksS[0]! || timeS >= marksS[marksS.length - 1]!) return null;
  return lastAtOrBefore(marksS, timeS);
}

/** Mean speed of a turn in rpm; null when the turn is not complete. */
export function turnSpeedRpm(wheel: PlotWheel, turn: number): number | null {
  const from = wheel.marksS[turn];
  const to = wheel.marksS[turn + 1];
  return from === undefined || to === undefined || to <= from ? null : 60 / (to - from);
}

/** Index of the last entry at or before `x` in a rising list; -1 when `x` is before the first. */
export function lastAtOrBefore(rising: ArrayLike<number>, x: number): number {
  let low = 0;
  let high = rising.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (rising[middle]! <= x) low = middle + 1;
    else high = middle;
  }
  return low - 1;
}

function between(xs: readonly number[], ys: readonly number[], x: number): number | null {
  const last = xs.length - 1;
  if (last < 1) return null;
  // Rounding must not put the first or last tooth itself outside.
  const slack = 1e-9 * (xs[last]! - xs[0]!);
  if (x < xs[0]! - slack || x > xs[last]! + slack) return null;
  const i = Math.min(Math.max(lastAtOrBefore(xs, x), 0), last - 1);
  return ys[i]! + ((x - xs[i]!) * (ys[i + 1]! - ys[i]!)) / (xs[i + 1]! - xs[i]!);
}
