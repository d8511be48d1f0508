import type { Wheel } from '../capture.ts';
import { risingEdgesS } from './first-edge.ts';
import type { Side } from './types.ts';

/** Crank angle of a time, on straight lines between tooth events; null outside of them. */
export function degreeAtTime(wheel: Wheel, timeS: number): number | null {
  const times = wheel.teethS;
  let low = 0;
  let high = times.length - 1;
  if (high < 1 || timeS < times[0]! || timeS > times[high]!) return null;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (times[middle]! <= timeS) low = middle;
    else high = middle;
  }
  const share = (timeS - times[low]!) / (times[high]! - times[low]!);
  return wheel.teethDeg[low]! + share * (wheel.teethDeg[high]! - wheel.teethDeg[low]!);
}

/**
 * Which of two reference marks begins the 720 degree cycle of a cam: the one after which the first rising edge comes
 * sooner. 0: the first mark of the capture; 360: the second; null when no edge lies within the teeth.
 */
export function cycleOriginDeg(cam: Side, wheel: Wheel): 0 | 360 | null {
  let soonest: { origin: 0 | 360; deg: number } | null = null;
  for (const time of risingEdgesS(cam)) {
    const deg = degreeAtTime(wheel, time);
    if (deg === null) continue;
    const inCycle = ((deg % 720) + 720) % 720;
    const origin = inCycle < 360 ? 0 : 360;
    if (soonest === null || inCycle - origin < soonest.deg) soonest = { origin, deg: inCycle - origin };
  }
  return soonest?.origin ?? null;
}
