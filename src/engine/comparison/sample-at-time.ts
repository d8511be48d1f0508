import type { TimeAxis } from '../capture.ts';
import { indexAtOrAfter, sampleCount, timeAt } from '../signal/time.ts';

/** The value at a time: on the straight line between two samples, or the last one where values hold. NaN outside and in holes. */
export function sampleAtTime(
  signal: { readonly axis: TimeAxis; readonly values: Float32Array },
  timeS: number,
): number {
  const { axis, values } = signal;
  const after = indexAtOrAfter(axis, timeS);
  if (after >= sampleCount(axis)) return Number.NaN;
  const afterS = timeAt(axis, after);
  if (after === 0 || afterS === timeS) return afterS - timeS > 1e-12 ? Number.NaN : values[after]!;
  const before = after - 1;
  if (axis.kind === 'uneven' && axis.holds) return values[before]!;
  const beforeS = timeAt(axis, before);
  return values[before]! + ((values[after]! - values[before]!) * (timeS - beforeS)) / (afterS - beforeS);
}
