import type { TimeAxis } from '../capture.ts';
import { timeAt } from '../signal/time.ts';
import { runsOf } from './runs.ts';

/**
 * Change a second: over the samples before and after each, one-sided at the ends of a run. A run of one sample has none. Exact for
 * a straight line and, at even steps, for a parabola.
 */
export function derivative(values: Float32Array, axis: TimeAxis): Float32Array {
  const made = new Float32Array(values.length).fill(Number.NaN);
  for (const [from, to] of runsOf(values)) {
    for (let i = from; i < to; i += 1) {
      const before = Math.max(i - 1, from);
      const after = Math.min(i + 1, to - 1);
      const length = timeAt(axis, after) - timeAt(axis, before);
      if (length > 0) made[i] = (values[after]! - values[before]!) / length;
    }
  }
  return made;
}

/**
 * Area under the trace from its first sample on, by trapezia; where values hold until the next, by rectangles. Over a hole
 * nothing is added: the area goes on after it as it was.
 */
export function integral(values: Float32Array, axis: TimeAxis): Float32Array {
  const made = new Float32Array(values.length).fill(Number.NaN);
  const holds = axis.kind === 'uneven' && axis.holds;
  let area = 0;
  for (const [from, to] of runsOf(values)) {
    made[from] = area;
    for (let i = from + 1; i < to; i += 1) {
      const height = holds ? values[i - 1]! : (values[i - 1]! + values[i]!) / 2;
      area += height * (timeAt(axis, i) - timeAt(axis, i - 1));
      made[i] = area;
    }
  }
  return made;
}
