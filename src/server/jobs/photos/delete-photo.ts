import { and, eq, isNull, sql } from 'drizzle-orm';
import type { PhotoRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { jobPhoto } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';

/** Takes a photo away; it can be brought back for 30 days. */
export async function deletePhoto(row: PhotoRecord): Promise<void> {
  const [gone] = await db()
    .update(jobPhoto)
    .set({ deletedAt: sql`now()`, edition: sql`${jobPhoto.edition} + 1` })
    .where(and(eq(jobPhoto.id, row.id), eq(jobPhoto.edition, row.edition), isNull(jobPhoto.deletedAt)))
    .returning({ id: jobPhoto.id });
  if (gone === undefined) throw new ApiError('stale');
}
