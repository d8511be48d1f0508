import { and, eq } from 'drizzle-orm';
import type { z } from 'zod';
import { uploadFields } from '../../../contract/areas/captures.ts';
import { membership, upload } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { validate } from '../../http/validate.ts';
import { newId } from '../../ids.ts';
import { checkJob, hasJob } from '../../jobs/check-job.ts';
import { inTransaction } from '../../queue/transaction.ts';
import { createCapture } from '../create-capture.ts';
import { cleanFileName } from '../title-of.ts';

/** What the stream told, where it could be watched from the first byte to the last. */
export interface Arrived {
  readonly bytes: number;
  readonly sha256: string;
  readonly fields: z.output<typeof uploadFields>;
  readonly fileName: string;
}

/**
 * Makes the capture of an upload whose bytes are all in the store, once: the row of the upload is locked, so of two that
 * finish it together the second gets the first one's capture.
 */
export async function finishUpload(uploadId: string, arrived?: Arrived): Promise<string> {
  return inTransaction(async ({ tx, send }) => {
    const [row] = await tx.select().from(upload).where(eq(upload.id, uploadId)).for('update');
    if (row === undefined) throw new ApiError('not_found');
    if (row.captureId !== null) return row.captureId;
    if (row.finishedAt !== null) throw new ApiError('not_found');
    const { personId, workshopId } = row;
    const [held] = await tx
      .select({ role: membership.role })
      .from(membership)
      .where(and(eq(membership.personId, personId), eq(membership.workshopId, workshopId)));
    if (held === undefined) throw new ApiError('not_found');
    const practice = held.role === 'learner';
    const fields = arrived?.fields ?? fieldsOf(row.metadata);
    if (arrived !== undefined) await checkJob(tx, workshopId, fields.jobId, practice);
    // A resumable upload was let in for a job; when that has gone since, what was sent is kept all the same.
    else if (fields.jobId !== undefined && (practice || !(await hasJob(tx, workshopId, fields.jobId))))
      delete fields.jobId;
    const { id } = await createCapture(
      { tx, send },
      {
        id: newId(),
        caller: { personId, workshopId, role: held.role },
        fields,
        fileName: arrived?.fileName ?? cleanFileName(row.metadata.filename ?? undefined),
        originalKey: uploadId,
        bytes: arrived?.bytes ?? row.length,
        sha256: arrived?.sha256 ?? '',
      },
    );
    await tx.update(upload).set({ captureId: id, finishedAt: new Date() }).where(eq(upload.id, uploadId));
    return id;
  });
}

/** The fields beside the file as the metadata of a resumable upload has them: a key without a value is an absent field. */
export function fieldsOf(metadata: Readonly<Record<string, string | null>>): z.output<typeof uploadFields> {
  const given = Object.entries(metadata).filter((entry): entry is [string, string] => entry[1] !== null);
  return validate(uploadFields, Object.fromEntries(given));
}
