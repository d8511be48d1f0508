import type { TimeAxis } from '../../capture.ts';
import { sampleCount, timeAt } from '../../signal/time.ts';
import type { Evidence } from '../../value.ts';

/** The whole capture as evidence; an empty list when there is no sample. */
export function whole(axis: TimeAxis): readonly Evidence[] {
  const count = sampleCount(axis);
  return count > 0 ? [{ from: timeAt(axis, 0), to: timeAt(axis, count - 1) }] : [];
}

/** Samples `from` to `to` (indices, fractions allowed) as a stretch of time, cut to the capture. */
export function stretch(axis: TimeAxis, from: number, to: number): Evidence {
  const last = Math.max(0, sampleCount(axis) - 1);
  const clip = (index: number) => timeAt(axis, Math.min(Math.max(index, 0), last));
  return { from: clip(from), to: clip(to) };
}
