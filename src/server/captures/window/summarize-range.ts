import { LEVEL_FACTOR } from '../../../engine/signal/pyramid.ts';
import { pyramidLayout } from '../../storage/pyramid-file.ts';
import { summarizeInto } from './summarize-into.ts';
import type { WindowSource } from './window-source.ts';

/**
 * First, extremes in time order and last of samples `from` to `to` at any bounds, exactly: whole blocks of the level where
 * there are some, and of the finer levels and the samples themselves at the two ends. Level -1 is the samples.
 */
export async function summarizeRange(
  source: WindowSource,
  signal: number,
  from: number,
  to: number,
  level: number,
): Promise<Float32Array> {
  const pieces = await piecesOf(source, signal, from, to, level);
  const values = new Float32Array(pieces.reduce((length, piece) => length + piece.length, 0));
  let at = 0;
  for (const piece of pieces) {
    values.set(piece, at);
    at += piece.length;
  }
  const summary = new Float32Array(4);
  summarizeInto(values, 0, values.length, summary, 0);
  return summary;
}

/** The stretch as values in time order whose first, extremes and last are those of its samples. */
async function piecesOf(
  source: WindowSource,
  signal: number,
  from: number,
  to: number,
  level: number,
): Promise<Float32Array[]> {
  if (from >= to) return [];
  if (level < 0) return [await source.samples(signal, from, to)];
  const { blockSize } = pyramidLayout(source.axis.count)[level]!;
  const first = Math.ceil(from / blockSize);
  const last = Math.floor(to / blockSize);
  if (first >= last) return piecesOf(source, signal, from, to, level - 1);
  const [before, inside, after] = await Promise.all([
    piecesOf(source, signal, from, first * blockSize, level - 1),
    source.blocks(signal, level, first, last),
    piecesOf(source, signal, last * blockSize, to, level - 1),
  ]);
  return [...before, inside, ...after];
}

/** The coarsest level whose blocks are at most a quarter of a column, or -1: the samples themselves. */
export function levelFor(count: number, samplesPerColumn: number): number {
  let level = -1;
  for (const { blockSize } of pyramidLayout(count)) {
    if (blockSize * LEVEL_FACTOR > samplesPerColumn) break;
    level += 1;
  }
  return level;
}
