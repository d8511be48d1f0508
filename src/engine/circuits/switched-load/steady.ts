import { sortedRange } from '../../signal/range.ts';
import { quantileSorted } from '../../signal/statistics.ts';
import type { LoadStates } from './states.ts';

/**
 * Nothing happens: nearly all samples lie within the noise, half a volt, or between 35 and 150 % of the rest level. A feed
 * sags that far while cranking; a driver that pulls it low, or a kick, goes further.
 */
export function isSteady(values: Float32Array, states: LoadStates): boolean {
  const sorted = sortedRange(values, 0, values.length, 1 << 18);
  if (sorted.length === 0) return false;
  const low = quantileSorted(sorted, 0.0005);
  const high = quantileSorted(sorted, 0.9995);
  if (high - low <= Math.max(12 * states.noise, 0.5)) return true;
  return states.rest > 0 && low >= 0.35 * states.rest && high <= 1.5 * states.rest;
}
