import type { TimeAxis } from '../../capture.ts';
import { rangeMedian } from '../../signal/range.ts';
import { indexAtOrAfter, timeAt } from '../../signal/time.ts';
import type { Evidence } from '../../value.ts';
import { stretch } from '../events/whole.ts';

const SETTLING_S = 0.2e-3;
const MOST = 200_000;

/**
 * Median of the samples outside `events` (rising, sample indices), a fifth of a millisecond after each left out as well, and
 * where those samples are. Nothing outside: null.
 */
export function outsideLevel(
  values: Float32Array,
  axis: TimeAxis,
  events: ReadonlyArray<{ readonly from: number; readonly to: number }>,
): { readonly level: number | null; readonly evidence: readonly Evidence[] } {
  const parts: Array<readonly [number, number]> = [];
  let from = 0;
  for (const event of events) {
    const to = Math.floor(event.from) - 1;
    if (to - from > 2) parts.push([from, to]);
    from = indexAtOrAfter(axis, timeAt(axis, Math.min(event.to, values.length - 1)) + SETTLING_S);
  }
  if (values.length - from > 2) parts.push([from, values.length]);
  const total = parts.reduce((sum, [a, b]) => sum + b - a, 0);
  const step = Math.max(1, Math.ceil(total / MOST));
  const kept = new Float32Array(Math.ceil(total / step) + parts.length);
  let count = 0;
  for (const [a, b] of parts) {
    for (let i = a; i < b; i += step) {
      kept[count] = values[i]!;
      count += 1;
    }
  }
  return { level: rangeMedian(kept, 0, count), evidence: parts.map(([a, b]) => stretch(axis, a, b - 1)) };
}
