import { and, eq, isNull, sql } from 'drizzle-orm';
import type { PhotoRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { jobPhoto } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';

/** Changes a caption, as the photo was opened when an edition was named; a change in between is then 412. */
export async function patchPhoto(
  row: PhotoRecord,
  caption: string,
  ifMatch: string | undefined,
): Promise<PhotoRecord> {
  const [changed] = await db()
    .update(jobPhoto)
    .set({ caption, edition: sql`${jobPhoto.edition} + 1` })
    .where(
      and(
        eq(jobPhoto.id, row.id),
        isNull(jobPhoto.deletedAt),
        ifMatch === undefined ? undefined : eq(jobPhoto.edition, row.edition),
      ),
    )
    .returning();
  if (changed === undefined) throw new ApiError('stale');
  return changed;
}
