import { sampleCount, timeAt } from '../../signal/time.ts';
import type { Side } from '../types.ts';
import { finished, meansOverSeconds, numberOf } from './resample.ts';

/** Supply voltage: 128 numbers from 0.1 s before the lowest dip to 1.18 s after it, in its rest level (else its highest), times three. */
export function supplyShape(side: Side): Float32Array | null {
  const rest = numberOf(side, 'rest_level') ?? numberOf(side, 'highest');
  if (rest === null || !(rest > 1)) return null;
  let lowest = Infinity;
  let at = 0;
  for (let i = 0; i < side.values.length; i++)
    if (side.values[i]! < lowest) {
      lowest = side.values[i]!;
      at = i;
    }
  if (sampleCount(side.axis) < 2) return null;
  const dipS = timeAt(side.axis, at);
  return finished([
    meansOverSeconds(side, dipS - 0.1, dipS + 1.18, 128).map((value) => 3 * (value / rest - 1)),
  ]);
}
