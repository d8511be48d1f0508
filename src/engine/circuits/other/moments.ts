import type { TimeAxis } from '../../capture.ts';
import { timeAt } from '../../signal/time.ts';

/** Extremes and averages of a signal over time. Indices point at the first lowest and first highest sample. */
export interface Moments {
  readonly lowestAt: number;
  readonly highestAt: number;
  readonly mean: number;
  readonly rms: number;
  /** Finite samples. */
  readonly n: number;
}

/**
 * Mean and rms of even samples count each sample once. Uneven samples are weighted by time: a straight line between rows,
 * or, for changes only, the row's value until the next row. Holes take their time out. No finite sample: null.
 */
export function momentsOf(values: Float32Array, axis: TimeAxis): Moments | null {
  let lowestAt = -1;
  let highestAt = -1;
  let n = 0;
  let sum = 0;
  let squares = 0;
  for (let i = 0; i < values.length; i += 1) {
    const value = values[i]!;
    if (Number.isNaN(value)) continue;
    if (lowestAt < 0 || value < values[lowestAt]!) lowestAt = i;
    if (highestAt < 0 || value > values[highestAt]!) highestAt = i;
    n += 1;
    sum += value;
    squares += value * value;
  }
  if (n === 0) return null;
  const weighted = axis.kind === 'uneven' ? overTime(values, axis, axis.holds) : null;
  return {
    lowestAt,
    highestAt,
    mean: weighted?.mean ?? sum / n,
    rms: weighted?.rms ?? Math.sqrt(squares / n),
    n,
  };
}

/** Integrals over time; the square of a straight line from a to b has the mean (a² + ab + b²) / 3. */
function overTime(
  values: Float32Array,
  axis: TimeAxis,
  holds: boolean,
): { mean: number; rms: number } | null {
  let timeS = 0;
  let area = 0;
  let squares = 0;
  for (let i = 0; i + 1 < values.length; i += 1) {
    const here = values[i]!;
    const next = holds ? here : values[i + 1]!;
    const stepS = timeAt(axis, i + 1) - timeAt(axis, i);
    if (Number.isNaN(here) || Number.isNaN(next)) continue;
    timeS += stepS;
    area += (stepS * (here + next)) / 2;
    squares += (stepS * (here * here + here * next + next * next)) / 3;
  }
  return timeS > 0 ? { mean: area / timeS, rms: Math.sqrt(squares / timeS) } : null;
}
