import type { TimeAxis } from '../engine/capture.ts';
import type { StoredAxis } from '../server/db/schema.ts';

/** What the database keeps of an axis: an uneven one's times lie in the store. */
export function storedAxis(axis: TimeAxis): StoredAxis {
  if (axis.kind === 'even') {
    const { kind, startS, stepS, count } = axis;
    return { kind, startS, stepS, count };
  }
  const { timesS, holds } = axis;
  return {
    kind: 'uneven',
    holds,
    count: timesS.length,
    startS: timesS[0] ?? 0,
    endS: timesS[timesS.length - 1] ?? 0,
  };
}
