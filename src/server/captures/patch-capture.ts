import { isDeepStrictEqual } from 'node:util';
import { and, eq, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { capturePatch } from '../../contract/areas/captures.ts';
import type { CaptureRecord, PersonCaller } from '../access.ts';
import { capture } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { checkIfMatch } from '../http/etag.ts';
import { checkJob } from '../jobs/check-job.ts';
import { QUEUES, type ReadJob } from '../queue/names.ts';
import { inTransaction } from '../queue/transaction.ts';
import { STOP_CHANNEL } from './cancel-capture.ts';
import { checkedDerived } from './checked-derived.ts';
import { mergeSignalRequests } from './merge-signal-requests.ts';
import { pendingKind } from './pending-kind.ts';

type Patch = z.output<typeof capturePatch>;

/**
 * Changes what people edit. Cylinders, signals or the way of reading raise the revision and queue the work in the same
 * transaction: reading again when the way of reading changed or there are no samples of it yet, else only measuring.
 * An empty `reading` on a capture that failed or was stopped tries again. Two at once: the later one is 412.
 */
export async function patchCapture(
  _caller: PersonCaller,
  row: CaptureRecord,
  patch: Patch,
  ifMatch: string | undefined,
): Promise<CaptureRecord> {
  checkIfMatch(ifMatch, row.edition);
  return inTransaction(async ({ tx, send, queueDb }) => {
    const [now] = await tx.select().from(capture).where(eq(capture.id, row.id)).for('update');
    if (now === undefined || now.deletedAt !== null) throw new ApiError('not_found');
    checkIfMatch(ifMatch, now.edition);
    await checkJob(tx, now.workshopId, patch.jobId, now.practice);
    const kind = await workFor(now, patch, () => pendingKind(queueDb, now));
    const [changed] = await tx
      .update(capture)
      .set({
        ...(patch.title === undefined ? {} : { title: patch.title }),
        ...(patch.note === undefined ? {} : { note: patch.note }),
        ...(patch.jobId === undefined ? {} : { jobId: patch.jobId }),
        ...(patch.cylinders === undefined ? {} : { cylinders: patch.cylinders }),
        ...(patch.reading === undefined ? {} : { hints: { ...now.hints, ...patch.reading } }),
        ...(patch.derived === undefined ? {} : { derived: checkedDerived(now, patch.derived) }),
        ...(patch.signals === undefined
          ? {}
          : { signalRequests: mergeSignalRequests(now.signalRequests, patch.signals) }),
        edition: now.edition + 1,
        updatedAt: sql`now()`,
        ...(kind === null
          ? {}
          : { status: 'queued' as const, progress: 0, error: null, revision: now.revision + 1 }),
      })
      .where(and(eq(capture.id, row.id), eq(capture.edition, now.edition)))
      .returning();
    if (changed === undefined) throw new ApiError('stale');
    if (kind !== null) {
      await queueDb.executeSql('select pg_notify($1, $2)', [STOP_CHANNEL, row.id]);
      await send(QUEUES.read, { captureId: row.id, revision: changed.revision, kind } satisfies ReadJob);
    }
    return changed;
  });
}

async function workFor(
  now: CaptureRecord,
  patch: Patch,
  pending: () => Promise<ReadJob['kind'] | null>,
): Promise<ReadJob['kind'] | null> {
  const reading = { ...now.hints, ...patch.reading };
  const rereads = patch.reading !== undefined && !isDeepStrictEqual(reading, now.hints);
  const derives = patch.derived !== undefined && !isDeepStrictEqual(patch.derived, now.derived);
  const requests = mergeSignalRequests(now.signalRequests, patch.signals ?? []);
  const remeasures =
    !isDeepStrictEqual(requests, now.signalRequests) ||
    (patch.cylinders !== undefined && patch.cylinders !== now.cylinders);
  const again = patch.reading !== undefined && (now.status === 'failed' || now.status === 'cancelled');
  if (rereads || again || derives) return 'read';
  if (!remeasures) return null;
  if (now.samplesVersion === 0) return 'read';
  // What is made from a signal follows its factor and circuit.
  if ((patch.derived ?? now.derived).length > 0) return 'read';
  if (now.status === 'ready' || now.status === 'measuring') return 'measure';
  if (now.status === 'queued') return (await pending()) ?? 'read';
  return 'read';
}
