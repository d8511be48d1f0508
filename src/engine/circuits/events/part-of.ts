import type { TimeAxis } from '../../capture.ts';
import { timeAt } from '../../signal/time.ts';

/** The time axis of `count` samples from sample `from` on. */
export function partOf(axis: TimeAxis, from: number, count: number): TimeAxis {
  return axis.kind === 'even'
    ? { ...axis, startS: timeAt(axis, from), count }
    : { ...axis, timesS: axis.timesS.subarray(from, from + count) };
}
