import type { TimeAxis, Wheel } from '../capture.ts';
import { sampleCount, timeAt } from '../signal/time.ts';

/**
 * Crank speed in rpm at every sample: that of each pair of tooth events at the middle of the pair, straight in between. Before the
 * first middle and after the last nothing is known.
 */
export function speedFromTeeth(
  axis: TimeAxis,
  { teethS, teethDeg }: Pick<Wheel, 'teethS' | 'teethDeg'>,
): Float32Array {
  const count = sampleCount(axis);
  const made = new Float32Array(count).fill(Number.NaN);
  const middles: number[] = [];
  const speeds: number[] = [];
  for (let i = 1; i < teethS.length; i += 1) {
    const length = teethS[i]! - teethS[i - 1]!;
    if (!(length > 0)) continue;
    middles.push((teethS[i]! + teethS[i - 1]!) / 2);
    // Degrees a second over 6 are turns a minute.
    speeds.push((teethDeg[i]! - teethDeg[i - 1]!) / length / 6);
  }
  let pair = 0;
  for (let i = 0; i < count; i += 1) {
    const time = timeAt(axis, i);
    while (pair < middles.length && middles[pair]! < time) pair += 1;
    if (pair === 0 || pair >= middles.length) {
      if (pair < middles.length && middles[pair] === time) made[i] = speeds[pair]!;
      continue;
    }
    const share = (time - middles[pair - 1]!) / (middles[pair]! - middles[pair - 1]!);
    made[i] = speeds[pair - 1]! + share * (speeds[pair]! - speeds[pair - 1]!);
  }
  return made;
}
