import { sortedRange } from '../../signal/range.ts';
import { quantileSorted } from '../../signal/statistics.ts';

/**
 * A load switched to ground stands at its feed, is pulled to ground and kicks beyond the feed. Turned over, the whole trace lies at
 * or below ground: the feed negative, the on level about zero, and rare kicks further down than the feed by half of it or more.
 *
 * @param noise of the reading, rms.
 */
export function pointsDown(values: Float32Array, noise: number): boolean {
  const sorted = sortedRange(values, 0, values.length, 65_536);
  if (sorted.length < 8) return false;
  const lowest = sorted[0]!;
  const lower = quantileSorted(sorted, 0.1);
  const upper = quantileSorted(sorted, 0.9995);
  const moves = upper - lower > 12 * noise;
  return moves && lower < -6 * noise && lowest < 1.5 * lower && -lowest > 3 * upper;
}
