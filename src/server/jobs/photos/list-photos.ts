import { and, asc, eq, isNull } from 'drizzle-orm';
import type { PhotoRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { jobPhoto } from '../../db/schema.ts';

/** All photos of a job that were not taken away, oldest first; a job has a bounded number. */
export const listPhotos = (jobId: string): Promise<PhotoRecord[]> =>
  db()
    .select()
    .from(jobPhoto)
    .where(and(eq(jobPhoto.jobId, jobId), isNull(jobPhoto.deletedAt)))
    .orderBy(asc(jobPhoto.createdAt), asc(jobPhoto.id));
