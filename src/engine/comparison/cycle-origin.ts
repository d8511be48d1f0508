import type { Wheel } from '../capture.ts';
import { crankAngleAt } from '../relations/crank-angle.ts';
import { risingEdgesS } from './first-edge.ts';
import type { Side } from './types.ts';

/**
 * Which of two reference marks begins the 720 degree cycle of a cam: the one after which the first rising edge comes
 * sooner. 0: the first mark of the capture; 360: the second; null when no edge lies within the teeth.
 */
export function cycleOriginDeg(cam: Side, wheel: Wheel): 0 | 360 | null {
  let soonest: { origin: 0 | 360; deg: number } | null = null;
  for (const time of risingEdgesS(cam)) {
    const deg = crankAngleAt(wheel, time);
    if (deg === null) continue;
    const inCycle = ((deg % 720) + 720) % 720;
    const origin = inCycle < 360 ? 0 : 360;
    if (soonest === null || inCycle - origin < soonest.deg) soonest = { origin, deg: inCycle - origin };
  }
  return soonest?.origin ?? null;
}
