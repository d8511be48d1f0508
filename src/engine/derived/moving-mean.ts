import { runsOf } from './runs.ts';

/** Mean of `length` samples (made odd) centred on each; fewer at the ends of a run, the same number on both sides. */
export function movingMean(values: Float32Array, length: number): Float32Array {
  const made = new Float32Array(values.length).fill(Number.NaN);
  const half = Math.max(Math.floor(length / 2), 0);
  for (const [from, to] of runsOf(values)) {
    const sums = new Float64Array(to - from + 1);
    for (let i = from; i < to; i += 1) sums[i - from + 1] = sums[i - from]! + values[i]!;
    for (let i = from; i < to; i += 1) {
      const reach = Math.min(half, i - from, to - 1 - i);
      made[i] = (sums[i + reach + 1 - from]! - sums[i - reach - from]!) / (2 * reach + 1);
    }
  }
  return made;
}
