import type { Wheel } from '../capture.ts';

/** A jump this large between neighbouring teeth is a break in the train, not a gap of the wheel. */
const BREAK_DEGREES = 300;

/**
 * Crank degrees of a moment, on the straight line between the tooth events around it. Null outside the teeth, and
 * across a break in which the teeth could not be followed. Times may be asked for in any order.
 */
export function crankAngleAt(wheel: Wheel, timeS: number): number | null {
  const { teethS, teethDeg } = wheel;
  let low = 0;
  let high = teethS.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (teethS[middle]! <= timeS) low = middle + 1;
    else high = middle;
  }
  const k = low - 1;
  if (k < 0 || k >= teethS.length) return null;
  if (k + 1 === teethS.length) return teethS[k] === timeS ? teethDeg[k]! : null;
  const step = teethDeg[k + 1]! - teethDeg[k]!;
  if (step >= BREAK_DEGREES) return null;
  return teethDeg[k]! + (step * (timeS - teethS[k]!)) / (teethS[k + 1]! - teethS[k]!);
}

/** Longest stretch of teeth without a break, by angle: within it the two turns of a 720 degree cycle stay in step. */
export function longestStretch(wheel: Wheel): {
  readonly fromS: number;
  readonly toS: number;
  readonly degrees: number;
} {
  const { teethS, teethDeg } = wheel;
  let best = { fromS: teethS[0] ?? 0, toS: teethS[0] ?? 0, degrees: 0 };
  let from = 0;
  for (let k = 1; k <= teethS.length; k += 1) {
    if (k < teethS.length && teethDeg[k]! - teethDeg[k - 1]! < BREAK_DEGREES) continue;
    const degrees = teethDeg[k - 1]! - teethDeg[from]!;
    if (degrees > best.degrees) best = { fromS: teethS[from]!, toS: teethS[k - 1]!, degrees };
    from = k;
  }
  return best;
}
