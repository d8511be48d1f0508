import { eq } from 'drizzle-orm';
import type { ExerciseContent } from '../../../contract/areas/teaching.ts';
import { type CaptureRecord, OPENERS, type PersonCaller } from '../../access.ts';
import { axisJson } from '../../captures/capture-json.ts';
import { db } from '../../db/client.ts';
import { captureSignal } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';

/**
 * That an exercise's content fits its capture: of the workshop, read, with those signals and that stretch.
 * @throws ApiError not_found, not_ready, invalid.
 */
export async function checkContent(
  caller: PersonCaller,
  workshopId: string,
  content: ExerciseContent,
): Promise<CaptureRecord> {
  const row = await OPENERS.capture(caller, 'captures.get', content.captureId);
  const invalid = (path: string, message: string) =>
    new ApiError('invalid', { details: [{ path: `content.${path}`, message }] });
  if (row.workshopId !== workshopId) throw invalid('captureId', 'is a capture of another workshop');
  if (row.axis === null || row.samplesVersion === 0)
    throw new ApiError('not_ready', {
      message: 'The capture is not read yet; there is no trace to ask about.',
    });
  const signals = await db()
    .select({ index: captureSignal.index })
    .from(captureSignal)
    .where(eq(captureSignal.captureId, row.id));
  const missing = content.signals.filter((wanted) => !signals.some(({ index }) => index === wanted));
  if (missing.length > 0)
    throw invalid('signals', `there is no signal ${missing.join(', ')} in this capture`);
  const { startS, durationS } = axisJson(row.axis);
  const endS = startS + durationS;
  if ((content.from ?? startS) >= endS || (content.to ?? endS) <= startS)
    throw invalid('from', `the trace lies from ${startS} to ${endS} s`);
  return row;
}
