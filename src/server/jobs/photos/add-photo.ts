import { createHash } from 'node:crypto';
import { and, count, eq, isNull } from 'drizzle-orm';
import type { z } from 'zod';
import type { photoFields } from '../../../contract/areas/jobs.ts';
import type { JobRecord, PersonCaller, PhotoRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { job, jobPhoto } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { newId } from '../../ids.ts';
import { deleteObjects } from '../../storage/delete-objects.ts';
import { photoKey, smallPhotoKey } from '../../storage/keys.ts';
import { putObject } from '../../storage/put-object.ts';
import { writeAnew } from './write-anew.ts';

export const PHOTOS_LIMIT = 200;

/** Writes a picture anew and adds it to a job: objects first, so that a row never names nothing. */
export async function addPhoto(
  caller: Pick<PersonCaller, 'personId' | 'name'>,
  row: Pick<JobRecord, 'id'>,
  sent: Uint8Array,
  fields: z.output<typeof photoFields>,
): Promise<PhotoRecord> {
  const picture = await writeAnew(sent);
  const id = newId();
  const keys = [photoKey(id), smallPhotoKey(id)] as const;
  try {
    await putObject(keys[0], picture.bytes, picture.contentType);
    await putObject(keys[1], picture.small, 'image/jpeg');
    return await db().transaction(async (tx) => {
      const [held] = await tx.select().from(job).where(eq(job.id, row.id)).for('update');
      if (held === undefined || held.deletedAt !== null) throw new ApiError('not_found');
      const [present] = await tx
        .select({ total: count() })
        .from(jobPhoto)
        .where(and(eq(jobPhoto.jobId, row.id), isNull(jobPhoto.deletedAt)));
      if ((present?.total ?? 0) >= PHOTOS_LIMIT)
        throw new ApiError('conflict', { message: `A job takes ${PHOTOS_LIMIT} photos at most.` });
      const [made] = await tx
        .insert(jobPhoto)
        .values({
          id,
          jobId: row.id,
          createdBy: caller.personId,
          author: caller.name,
          caption: fields.caption ?? '',
          check: fields.check ?? null,
          contentType: picture.contentType,
          width: picture.width,
          height: picture.height,
          bytes: picture.bytes.length,
          sha256: createHash('sha256').update(picture.bytes).digest('hex'),
        })
        .returning();
      if (made === undefined) throw new Error('the photo was not returned');
      return made;
    });
  } catch (error) {
    await deleteObjects(keys).catch(() => {});
    throw error;
  }
}
