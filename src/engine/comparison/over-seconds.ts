import { indexAtOrAfter, sampleCount } from '../signal/time.ts';
import { sampleAtTime } from './sample-at-time.ts';
import type { Side } from './types.ts';

/**
 * The signal from `fromS` on in `count` equal steps. A step that holds more than two samples gives the one farthest
 * from the step's first sample, so that a narrow kick is not lost between steps. NaN where no sample lies.
 */
export function overSeconds(side: Side, fromS: number, stepS: number, count: number): Float64Array {
  const total = sampleCount(side.axis);
  return Float64Array.from({ length: count }, (_, i) => {
    const timeS = fromS + i * stepS;
    const from = indexAtOrAfter(side.axis, timeS - stepS / 2);
    const to = Math.min(indexAtOrAfter(side.axis, timeS + stepS / 2), total);
    if (to - from <= 2) return sampleAtTime(side, timeS);
    const first = side.values[from]!;
    let farthest = first;
    for (let k = from + 1; k < to; k++) {
      const value = side.values[k]!;
      if (Math.abs(value - first) > Math.abs(farthest - first)) farthest = value;
    }
    return farthest;
  });
}
