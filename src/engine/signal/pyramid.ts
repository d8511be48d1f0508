/**
 * A pyramid of summaries for drawing: every block keeps its first sample, its lowest and its highest in the time order in
 * which they occur, and its last. Drawn as a plain line, four values a block keep every one-sample spike.
 *
 * Holes (NaN) are skipped; a block that holds nothing else is four NaN. Of equal extremes the first counts. The last
 * block may be partial. One sample gives that sample four times; no samples give no levels.
 */

/** One level: `values` holds `blocks` times four values, block k from sample k * blockSize on. */
export interface PyramidLevel {
  readonly blockSize: number;
  readonly blocks: number;
  readonly values: Float32Array;
}

/** First, earlier extreme, later extreme, last. */
export type Summary = readonly [first: number, earlier: number, later: number, last: number];

export const FIRST_BLOCK = 64;
export const LEVEL_FACTOR = 4;
/** A level with at most this many blocks is the last. */
export const ENOUGH_BLOCKS = 64;

/** Levels of 64 samples a block, then four times that, until a level has at most 64 blocks. Three linear passes in all. */
export function buildPyramid(samples: Float32Array): PyramidLevel[] {
  if (samples.length === 0) return [];
  const levels = [level(samples, FIRST_BLOCK)];
  for (let last = levels[0]!; last.blocks > ENOUGH_BLOCKS; last = levels[levels.length - 1]!) {
    levels.push(coarser(last));
  }
  return levels;
}

/** The same four values for samples `from` up to, not including, `to` (cut to the array); all NaN when there are none. */
export function summarize(samples: Float32Array, from: number, to: number): Summary {
  const into = new Float32Array(4);
  put(samples, Math.max(0, Math.ceil(from)), Math.min(samples.length, Math.ceil(to)), into, 0);
  return [into[0]!, into[1]!, into[2]!, into[3]!];
}

function level(samples: Float32Array, blockSize: number): PyramidLevel {
  const blocks = Math.ceil(samples.length / blockSize);
  const values = new Float32Array(blocks * 4);
  for (let block = 0; block < blocks; block += 1) {
    put(samples, block * blockSize, Math.min(samples.length, (block + 1) * blockSize), values, block * 4);
  }
  return { blockSize, blocks, values };
}

/**
 * A block's four values read as four samples have the block's own first, extremes and last, so a coarser level is made
 * from the finer one by the same rule.
 */
function coarser(finer: PyramidLevel): PyramidLevel {
  const { blocks, values } = level(finer.values, LEVEL_FACTOR * 4);
  return { blockSize: finer.blockSize * LEVEL_FACTOR, blocks, values };
}

function put(samples: Float32Array, from: number, to: number, into: Float32Array, at: number): void {
  let first = Number.NaN;
  let last = Number.NaN;
  let lowest = Number.POSITIVE_INFINITY;
  let highest = Number.NEGATIVE_INFINITY;
  let lowestAt = -1;
  let highestAt = -1;
  for (let i = from; i < to; i += 1) {
    const value = samples[i]!;
    if (Number.isNaN(value)) continue;
    if (lowestAt < 0 && highestAt < 0) first = value;
    if (value < lowest || lowestAt < 0) {
      lowest = value;
      lowestAt = i;
    }
    if (value > highest || highestAt < 0) {
      highest = value;
      highestAt = i;
    }
    last = value;
  }
  const none = lowestAt < 0;
  into[at] = first;
  into[at + 1] = none ? Number.NaN : lowestAt <= highestAt ? lowest : highest;
  into[at + 2] = none ? Number.NaN : lowestAt <= highestAt ? highest : lowest;
  into[at + 3] = last;
}
