import { eq, sql } from 'drizzle-orm';
import type { PhotoRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { jobPhoto } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';

/** Brings a photo back; one that is there stays as it is. */
export async function restorePhoto(row: PhotoRecord): Promise<PhotoRecord> {
  if (row.deletedAt === null) return row;
  const [back] = await db()
    .update(jobPhoto)
    .set({ deletedAt: null, edition: sql`${jobPhoto.edition} + 1` })
    .where(eq(jobPhoto.id, row.id))
    .returning();
  if (back === undefined) throw new ApiError('not_found');
  return back;
}
