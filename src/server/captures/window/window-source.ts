import type { StoredAxis } from '../../db/schema.ts';

/** What a window is made from, piece by piece. Indices are samples; a level counts from 0, the finest. */
export interface WindowSource {
  readonly axis: StoredAxis;
  /** Samples `from` up to, not including, `to`. */
  samples(signal: number, from: number, to: number): Promise<Float32Array>;
  /** Blocks `from` up to, not including, `to` of a pyramid level, four values each. */
  blocks(signal: number, level: number, from: number, to: number): Promise<Float32Array>;
  /** Times of an uneven axis. */
  times(from: number, to: number): Promise<Float64Array>;
  /** Times of the first samples of blocks of an uneven axis. */
  blockTimes(level: number, from: number, to: number): Promise<Float64Array>;
}
