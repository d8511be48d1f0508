import { and, asc, eq, isNotNull, isNull, lt, or, sql } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { capture, pendingSignUp, upload } from '../../db/schema.ts';
import { sweepJobs } from '../../jobs/sweep-jobs.ts';
import { deleteObject, deleteObjects } from '../../storage/delete-objects.ts';
import { capturePrefix } from '../../storage/keys.ts';
import { listKeys } from '../../storage/list-keys.ts';
import { dropUpload } from '../uploads/drop-upload.ts';

const AT_A_TIME = 200;
/** Nobody carries on with an upload this old. */
const LONG_AGO = sql`now() - interval '7 days'`;

/**
 * Removes for good what was deleted 30 days ago (objects first, so that a row never names nothing and a broken-off sweep is
 * taken up again), uploads
 * that nobody carried on with for a week, and sign-ups that were not confirmed.
 */
export async function sweep(): Promise<{ captures: number; uploads: number }> {
  const captures = await sweepCaptures();
  const uploads = await sweepUploads();
  await sweepJobs();
  await db().delete(pendingSignUp).where(lt(pendingSignUp.expiresAt, sql`now()`));
  return { captures, uploads };
}

async function sweepCaptures(): Promise<number> {
  const due = await db()
    .select({ id: capture.id, originalKey: capture.originalKey })
    .from(capture)
    .where(lt(capture.deletedAt, sql`now() - interval '30 days'`))
    .orderBy(asc(capture.deletedAt))
    .limit(AT_A_TIME);
  for (const { id, originalKey } of due) {
    await deleteObjects(await listKeys(capturePrefix(id)));
    await deleteObject(originalKey);
    await db()
      .delete(capture)
      .where(and(eq(capture.id, id), lt(capture.deletedAt, sql`now() - interval '30 days'`)));
  }
  return due.length;
}

async function sweepUploads(): Promise<number> {
  const due = await db()
    .select({ id: upload.id })
    .from(upload)
    .where(and(isNull(upload.captureId), or(isNotNull(upload.finishedAt), lt(upload.createdAt, LONG_AGO))))
    .limit(AT_A_TIME);
  for (const { id } of due) await dropUpload(id);
  return due.length;
}
