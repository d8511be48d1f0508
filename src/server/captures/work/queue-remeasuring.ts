import { and, eq, ne } from 'drizzle-orm';
import { ENGINE_VERSION } from '../../../engine/version.ts';
import { db } from '../../db/client.ts';
import { capture, measurement } from '../../db/schema.ts';
import { QUEUES, type ReadJob } from '../../queue/names.ts';
import { inTransaction } from '../../queue/transaction.ts';
import { isOlderVersion } from './is-older-version.ts';

const AT_A_TIME = 500;

/**
 * Queues captures that an older engine measured, behind everything that a person waits for. Old values stay until they are
 * replaced. A capture that waits already is not queued twice.
 */
export async function queueRemeasuring(): Promise<number> {
  const rows = await db()
    .select({ id: capture.id, revision: capture.revision, engine: measurement.engine })
    .from(measurement)
    .innerJoin(capture, eq(capture.id, measurement.captureId))
    .where(
      and(
        ne(measurement.engine, ENGINE_VERSION),
        eq(capture.status, 'ready'),
        eq(measurement.revision, capture.revision),
      ),
    )
    .limit(AT_A_TIME);
  const old = rows.filter(({ engine }) => isOlderVersion(engine, ENGINE_VERSION));
  if (old.length === 0) return 0;
  await inTransaction(async ({ send }) => {
    for (const { id, revision } of old) {
      const data: ReadJob = { captureId: id, revision, kind: 'measure' };
      await send(QUEUES.remeasure, data, { singletonKey: id });
    }
  });
  return old.length;
}
