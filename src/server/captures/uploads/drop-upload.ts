import { AbortMultipartUploadCommand, ListMultipartUploadsCommand } from '@aws-sdk/client-s3';
import { and, eq, isNull, sql } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { upload } from '../../db/schema.ts';
import { fromStore } from '../../storage/away.ts';
import { bucket, store } from '../../storage/client.ts';
import { deleteObjects } from '../../storage/delete-objects.ts';

/**
 * Removes an upload that became no capture: its parts and what the upload package keeps beside them, then its row. The row
 * is marked first, so that it cannot become a capture meanwhile; the mark stays when this is broken off, and the sweep
 * carries on. Gives false when it had become a capture.
 */
export async function dropUpload(id: string): Promise<boolean> {
  const [marked] = await db()
    .update(upload)
    .set({ finishedAt: sql`now()` })
    .where(and(eq(upload.id, id), isNull(upload.captureId)))
    .returning({ id: upload.id });
  if (marked === undefined) return false;
  await abortParts(id);
  await deleteObjects([id, `${id}.part`, `${id}.info`]);
  await db()
    .delete(upload)
    .where(and(eq(upload.id, id), isNull(upload.captureId)));
  return true;
}

async function abortParts(key: string): Promise<void> {
  const { Uploads = [] } = await fromStore(() =>
    store().send(new ListMultipartUploadsCommand({ Bucket: bucket(), Prefix: key })),
  );
  for (const { Key, UploadId } of Uploads) {
    if (Key !== key || UploadId === undefined) continue;
    await fromStore(() =>
      store().send(new AbortMultipartUploadCommand({ Bucket: bucket(), Key: key, UploadId })),
    );
  }
}
