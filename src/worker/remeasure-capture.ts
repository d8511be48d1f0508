import { eq } from 'drizzle-orm';
import { ENGINE_VERSION } from '../engine/version.ts';
import { commitMeasured } from '../server/captures/work/commit-measured.ts';
import { endJob } from '../server/captures/work/end-job.ts';
import { isOlderVersion } from '../server/captures/work/is-older-version.ts';
import { db } from '../server/db/client.ts';
import { capture, measurement } from '../server/db/schema.ts';
import { ApiError } from '../server/errors.ts';
import { readJob } from '../server/queue/names.ts';
import type { TakenJob } from '../server/queue/take-job.ts';
import { runThread } from './run-thread.ts';
import type { ThreadMessage } from './thread-messages.ts';
import { taskFor } from './work-on-capture.ts';

/** Measures a ready capture again with this engine; its old values stay until the new ones are there. */
export async function remeasureCapture(job: TakenJob, signal: AbortSignal): Promise<void> {
  const { captureId, revision } = readJob.parse(job.data);
  const [found] = await db()
    .select({ row: capture, engine: measurement.engine })
    .from(capture)
    .innerJoin(measurement, eq(measurement.captureId, capture.id))
    .where(eq(capture.id, captureId));
  const due =
    found?.row.status === 'ready' &&
    found.row.revision === revision &&
    isOlderVersion(found.engine, ENGINE_VERSION);
  if (!found || !due) return endJob(job);
  const { row } = found;
  const at = { id: row.id, revision, samplesVersion: row.samplesVersion };
  await runThread(
    await taskFor({ row, kind: 'measure' }, row.samplesVersion),
    signal,
    async (message: ThreadMessage) => {
      if (message.type === 'measured') await commitMeasured(job, at, message, true);
      if (message.type === 'away') throw new ApiError('service_away', { cause: new Error(message.message) });
    },
  );
}
