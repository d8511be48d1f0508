import type { TimeAxis } from '../../capture.ts';
import { type EvenMeans, evenMeans, movingMean } from '../../signal/even-means.ts';
import { sortedRange } from '../../signal/range.ts';
import { quantileSorted } from '../../signal/statistics.ts';
import { timeAt } from '../../signal/time.ts';

/** The time the starter turns the engine, and its current at a lower, even rate (a reversed clamp turned round). */
export interface Cranking {
  readonly means: EvenMeans;
  readonly reversed: boolean;
  /** Indices into `means.values`: first with current, and one past the last. */
  readonly from: number;
  readonly to: number;
  /** The current comes on within the capture, so its first peak is the inrush. */
  readonly startSeen: boolean;
  /** Middle of the current while cranking. */
  readonly level: number;
}

/** Fine enough for 40 compressions a second, coarse enough to lose the commutator's ripple and the noise. */
const STEP_S = 2e-3;
/** A starter under load takes more; less is another consumer. Common practice, no source. */
const LEAST_A = 15;

/** null: no finite sample, or never more than 15 A for a tenth of a second. */
export function findCranking(values: Float32Array, axis: TimeAxis): Cranking | null {
  const raw = evenMeans(values, axis, STEP_S);
  if (!raw) return null;
  const sorted = Float64Array.from(raw.values).sort();
  const high = quantileSorted(sorted, 0.98);
  const low = quantileSorted(sorted, 0.02);
  const reversed = -low > Math.abs(high) && -low > LEAST_A;
  const means = reversed ? { ...raw, values: raw.values.map((value) => -value) } : raw;
  const smooth = movingMean(means.values, Math.round(0.03 / means.stepS));
  const busy = Float32Array.from(smooth.filter((value) => value > 0.25 * Math.max(high, -low)));
  if (busy.length * means.stepS < 0.1) return null;
  const level = quantileSorted(sortedRange(busy, 0, busy.length), 0.5);
  if (level < LEAST_A) return null;
  const [from, to] = longestAbove(smooth, 0.35 * level);
  const before = means.values.subarray(0, from);
  const startSeen = from * means.stepS >= 0.004 && before.some((value) => value < 0.25 * level);
  return { means, reversed, from: walkBack(means.values, from, 0.3 * level), to, startSeen, level };
}

function longestAbove(values: Float64Array, level: number): readonly [number, number] {
  let best: readonly [number, number] = [0, 0];
  let from = -1;
  for (let i = 0; i <= values.length; i += 1) {
    const above = i < values.length && values[i]! > level;
    if (above && from < 0) from = i;
    if (!above && from >= 0) {
      if (i - from > best[1] - best[0]) best = [from, i];
      from = -1;
    }
  }
  return best;
}

/** Smoothing starts the current early or late by half its width; the means themselves tell the moment. */
function walkBack(values: Float64Array, from: number, level: number): number {
  let i = from;
  while (i > 0 && values[i - 1]! > level) i -= 1;
  while (i + 1 < values.length && values[i]! <= level) i += 1;
  return i;
}

/** Time of a place in the means. */
export const meansTimeAt = (means: EvenMeans, index: number) => means.startS + index * means.stepS;

/** Highest sample while cranking, in the first half second: its value and index; null when there is none. */
export function inrushPeak(
  values: Float32Array,
  axis: TimeAxis,
  cranking: Cranking,
): { value: number; at: number } | null {
  const fromS = meansTimeAt(cranking.means, cranking.from) - 2 * cranking.means.stepS;
  const toS = fromS + 0.5;
  const sign = cranking.reversed ? -1 : 1;
  let at = -1;
  for (let i = 0; i < values.length; i += 1) {
    const timeS = timeAt(axis, i);
    if (timeS < fromS || Number.isNaN(values[i]!)) continue;
    if (timeS > toS) break;
    if (at < 0 || sign * values[i]! > sign * values[at]!) at = i;
  }
  return at < 0 ? null : { value: sign * values[at]!, at };
}
