import { extent } from '../../signal/levels.ts';
import { sortedRange } from '../../signal/range.ts';
import { quantileSorted } from '../../signal/statistics.ts';
import type { LoadStates } from './states.ts';

/** Rare samples far below the rest and none as far above: a load switched to ground kicks upwards only. */
export function pointsDown(values: Float32Array, { rest, noise }: LoadStates): boolean {
  const ends = extent(values);
  if (!ends) return false;
  const up = ends.highest - rest;
  const down = rest - ends.lowest;
  const sorted = sortedRange(values, 0, values.length);
  const spreadOfMost = quantileSorted(sorted, 0.9) - quantileSorted(sorted, 0.1);
  return rest < -6 * noise && down > 3 * up && down > 2.5 * Math.max(Math.abs(rest), spreadOfMost);
}
