import { pyramidLayout } from '../../storage/pyramid-file.ts';
import { countWhile } from './find-index.ts';
import { summarizeInto } from './summarize-into.ts';
import { levelFor } from './summarize-range.ts';
import type { WindowSource } from './window-source.ts';

/** Up to here every column's bounds are found among the times themselves; above, among the times of blocks. */
const EXACT_SAMPLES = 1_000_000;

export interface Bounds {
  /** -1: the samples themselves. */
  readonly level: number;
  /** Sample or block at which each column begins, and the end of the last: columns + 1 numbers. */
  readonly starts: Float64Array;
}

/** Where columns of the same length in time begin on an uneven axis. Found once for all signals. */
export async function unevenBounds(
  source: WindowSource,
  span: { readonly fromS: number; readonly toS: number; readonly from: number; readonly to: number },
  columns: number,
): Promise<Bounds> {
  const { fromS, toS, from, to } = span;
  const count = to - from;
  const level = count <= EXACT_SAMPLES ? -1 : levelFor(source.axis.count, count / columns);
  const blockSize = level < 0 ? 1 : pyramidLayout(source.axis.count)[level]!.blockSize;
  const first = Math.floor(from / blockSize);
  const end = Math.ceil(to / blockSize);
  const times = level < 0 ? await source.times(first, end) : await source.blockTimes(level, first, end);
  const starts = new Float64Array(columns + 1);
  starts[0] = first;
  starts[columns] = end;
  let passed = 0;
  for (let column = 1; column < columns; column += 1) {
    const boundS = fromS + (column * (toS - fromS)) / columns;
    passed += countWhile(times.subarray(passed), (time) => time < boundS);
    starts[column] = first + passed;
  }
  return { level, starts };
}

/**
 * Four values a column of the same length in time. A column without a sample holds the value before it where values hold
 * (changes only); else it lies on the straight line between its neighbours, as the drawn line would.
 */
export async function unevenColumns(
  source: WindowSource,
  signal: number,
  { level, starts }: Bounds,
): Promise<Float32Array> {
  const columns = starts.length - 1;
  const first = starts[0]!;
  const data =
    level < 0
      ? await source.samples(signal, first, starts[columns]!)
      : await source.blocks(signal, level, first, starts[columns]!);
  const each = level < 0 ? 1 : 4;
  const values = new Float32Array(columns * 4);
  const empty: number[] = [];
  for (let column = 0; column < columns; column += 1) {
    const start = (starts[column]! - first) * each;
    const end = (starts[column + 1]! - first) * each;
    if (start >= end) empty.push(column);
    else summarizeInto(data, start, end, values, column * 4);
  }
  const holds = source.axis.kind === 'uneven' && source.axis.holds;
  fillEmpty(values, empty, holds);
  return values;
}

function fillEmpty(values: Float32Array, empty: readonly number[], holds: boolean): void {
  const columns = values.length / 4;
  for (let k = 0; k < empty.length; ) {
    let end = k;
    while (empty[end + 1] === empty[end]! + 1) end += 1;
    const before = empty[k]! - 1;
    const after = empty[end]! + 1;
    const left = before < 0 ? Number.NaN : values[before * 4 + 3]!;
    const right = after >= columns ? Number.NaN : values[after * 4]!;
    for (let column = before + 1; column < after; column += 1) {
      const part = (column - before) / (after - before);
      const value = holds || Number.isNaN(right) ? left : left + (right - left) * part;
      values.fill(value, column * 4, column * 4 + 4);
    }
    k = end + 1;
  }
}
