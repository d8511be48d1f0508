import { pyramidLayout } from '../../storage/pyramid-file.ts';
import type { WindowSource } from './window-source.ts';

/**
 * First sample at or after `timeS` (0 to count), or with `after` the first one strictly after it. On an uneven axis the
 * search goes down the levels of block times, a few numbers a level, so it reads little however long the capture is.
 */
export async function findIndex(source: WindowSource, timeS: number, after = false): Promise<number> {
  const { axis } = source;
  if (axis.kind === 'even') {
    // Times that were written with few digits lie a rounding error beside their sample.
    const position = (timeS - axis.startS) / axis.stepS;
    const index = after ? Math.floor(position + 1e-6) + 1 : Math.ceil(position - 1e-6);
    return Math.min(Math.max(index, 0), axis.count);
  }
  const before = (time: number) => (after ? time <= timeS : time < timeS);
  const places = pyramidLayout(axis.count);
  let low = 0;
  let high = axis.count;
  for (let level = places.length - 1; level >= 0; level -= 1) {
    const { blockSize } = places[level]!;
    const first = Math.floor(low / blockSize);
    const times = await source.blockTimes(level, first, Math.ceil(high / blockSize));
    const count = countWhile(times, before);
    if (count === 0) return low;
    low = (first + count - 1) * blockSize;
    high = Math.min(low + blockSize, axis.count);
  }
  return low + countWhile(await source.times(low, high), before);
}

/** How many leading entries satisfy the test; the rest do not (sorted). */
export function countWhile(times: Float64Array, test: (time: number) => boolean): number {
  let low = 0;
  let high = times.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (test(times[middle]!)) low = middle + 1;
    else high = middle;
  }
  return low;
}
