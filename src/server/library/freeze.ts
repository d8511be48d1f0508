import type { CaptureInput, TimeAxis } from '../../engine/capture.ts';
import { indexAtOrAfter, sampleCount, timeAt } from '../../engine/signal/time.ts';
import type { StoredAxis } from '../db/schema.ts';
import { ApiError } from '../errors.ts';

/** Most samples, over all signals, of a chosen stretch: it is copied and measured while the person waits. */
const MOST_SAMPLES = 20_000_000;

/**
 * Cuts a stretch out of a capture; times stay those of the capture. The samples are views, nothing is copied.
 * @throws ApiError invalid when the stretch holds fewer than two samples or is too long to be frozen.
 */
export function cutStretch(input: CaptureInput, fromS: number, toS: number): CaptureInput {
  const first = indexAtOrAfter(input.axis, fromS);
  const end = Math.min(indexAtOrAfter(input.axis, toS) + 1, sampleCount(input.axis));
  if (end - first < 2)
    throw new ApiError('invalid', { details: [{ path: 'from', message: 'the stretch holds no samples' }] });
  if ((end - first) * input.signals.length > MOST_SAMPLES)
    throw new ApiError('invalid', {
      details: [{ path: 'to', message: `choose a stretch of at most ${MOST_SAMPLES / 1e6} million samples` }],
    });
  return {
    axis: cutAxis(input.axis, first, end),
    cylinders: input.cylinders,
    signals: input.signals.map((signal) => ({ ...signal, samples: signal.samples.subarray(first, end) })),
  };
}

function cutAxis(axis: TimeAxis, first: number, end: number): TimeAxis {
  if (axis.kind === 'uneven') return { ...axis, timesS: axis.timesS.subarray(first, end) };
  return { kind: 'even', startS: timeAt(axis, first), stepS: axis.stepS, count: end - first };
}

export function storedAxisOf(axis: TimeAxis): StoredAxis {
  if (axis.kind === 'even') return axis;
  const count = axis.timesS.length;
  return {
    kind: 'uneven',
    holds: axis.holds,
    count,
    startS: axis.timesS[0] ?? 0,
    endS: axis.timesS[count - 1] ?? 0,
  };
}
