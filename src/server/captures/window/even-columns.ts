import { pyramidLayout } from '../../storage/pyramid-file.ts';
import { summarizeInto } from './summarize-into.ts';
import { levelFor, summarizeRange } from './summarize-range.ts';
import type { WindowSource } from './window-source.ts';

/**
 * Four values a column of samples `from` to `to`, each column the same number of samples. The outer ends are exact; the
 * bounds between columns lie at block bounds of the pyramid level that is read.
 */
export async function evenColumns(
  source: WindowSource,
  signal: number,
  from: number,
  to: number,
  columns: number,
): Promise<Float32Array> {
  const perColumn = (to - from) / columns;
  const level = levelFor(source.axis.count, perColumn);
  const values = new Float32Array(columns * 4);
  if (level < 0) {
    const samples = await source.samples(signal, from, to);
    let start = 0;
    for (let column = 0; column < columns; column += 1) {
      const end = column + 1 === columns ? to - from : Math.round((column + 1) * perColumn);
      summarizeInto(samples, start, end, values, column * 4);
      start = end;
    }
    return values;
  }
  const { blockSize } = pyramidLayout(source.axis.count)[level]!;
  /** Block at which column `column` begins, for 1 to columns - 1. */
  const bound = (column: number) => Math.round((from + column * perColumn) / blockSize);
  if (columns === 1) return summarizeRange(source, signal, from, to, level);
  const firstInner = bound(1);
  const lastInner = bound(columns - 1);
  const [head, inner, tail] = await Promise.all([
    summarizeRange(source, signal, from, firstInner * blockSize, level),
    source.blocks(signal, level, firstInner, lastInner),
    summarizeRange(source, signal, lastInner * blockSize, to, level),
  ]);
  values.set(head, 0);
  let start = firstInner;
  for (let column = 1; column < columns - 1; column += 1) {
    const end = bound(column + 1);
    summarizeInto(inner, (start - firstInner) * 4, (end - firstInner) * 4, values, column * 4);
    start = end;
  }
  values.set(tail, (columns - 1) * 4);
  return values;
}
