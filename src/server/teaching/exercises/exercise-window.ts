import type { z } from 'zod';
import type { windowQuery } from '../../../contract/areas/captures.ts';
import type { ExerciseRecord, PersonCaller } from '../../access.ts';
import type { BuiltWindow } from '../../captures/window/build-window.ts';
import { captureWindow } from '../../captures/window/capture-window.ts';
import { ApiError } from '../../errors.ts';
import { ownAttempt } from '../attempts/own-attempt.ts';
import { traceOf, traceVersion } from './trace-of.ts';
import { versionOf } from './version.ts';

const clamp = (value: number, low: number, high: number) => Math.min(Math.max(value, low), high);

/**
 * Samples of the exercise's stretch under its own signal numbers. Nothing in it names the capture.
 * @throws ApiError not_found when the capture is gone, samples_changed for another version.
 */
export async function exerciseWindow(
  row: ExerciseRecord,
  caller: PersonCaller,
  query: z.output<typeof windowQuery>,
): Promise<BuiltWindow & { readonly version: number }> {
  const own = await ownAttempt(row.id, caller.personId);
  const { content, version: shown } = await versionOf(row.id, own?.version ?? row.version);
  const trace = await traceOf(content);
  if (trace === null)
    throw new ApiError('not_found', { message: 'The trace of this exercise is no longer there.' });
  const version = traceVersion(trace.capture.samplesVersion, shown);
  if (query.v !== undefined && query.v !== version) throw new ApiError('samples_changed');
  const places = query.signals ?? content.signals.map((_, place) => place);
  const signals = places.map((place) => {
    const index = content.signals[place];
    if (index === undefined)
      throw new ApiError('invalid', {
        details: [{ path: 'signals', message: `there is no signal ${place}` }],
      });
    return index;
  });
  const { headers, body } = await captureWindow(trace.capture, {
    columns: query.columns,
    from: clamp(query.from, trace.fromS, trace.toS),
    to: clamp(query.to, trace.fromS, trace.toS),
    signals,
    v: undefined,
  });
  return {
    body,
    version,
    headers: { ...headers, 'Gapmark-Signals': places.join(','), 'Gapmark-Samples-Version': String(version) },
  };
}
