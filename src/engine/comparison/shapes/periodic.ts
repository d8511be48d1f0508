import { quantile } from '../../signal/statistics.ts';
import { sampleCount, timeAt } from '../../signal/time.ts';
import { risingEdgesS } from '../first-edge.ts';
import type { Side } from '../types.ts';
import { finished, MOST_EVENTS, meanOf, meansOverSeconds } from './resample.ts';

/** Anything else: two periods of what repeats, laid on one another, 0 low and 1 high; without a period the whole stretch. */
export function periodicShape(side: Side): Float32Array | null {
  const low = quantile(side.values, 0.02);
  const high = quantile(side.values, 0.98);
  if (low === null || high === null || !(high > low) || sampleCount(side.axis) < 2) return null;
  const scaled = (values: Float64Array) => values.map((value) => (value - low) / (high - low));
  const edges = risingEdgesS(side);
  const pairs: Float64Array[] = [];
  for (let i = 0; i + 2 < edges.length && pairs.length < MOST_EVENTS; i += 2)
    pairs.push(meansOverSeconds(side, edges[i]!, edges[i + 2]!, 128));
  if (pairs.length > 0) return finished([scaled(meanOf(pairs))]);
  const from = timeAt(side.axis, 0);
  return finished([scaled(meansOverSeconds(side, from, timeAt(side.axis, sampleCount(side.axis) - 1), 128))]);
}
