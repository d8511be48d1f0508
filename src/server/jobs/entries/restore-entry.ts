import { eq, sql } from 'drizzle-orm';
import type { JobEntryRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { jobEntry } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';

/** Brings a note or a reading back; one that is there stays as it is. */
export async function restoreEntry(row: JobEntryRecord): Promise<JobEntryRecord> {
  if (row.deletedAt === null) return row;
  const [back] = await db()
    .update(jobEntry)
    .set({ deletedAt: null, edition: sql`${jobEntry.edition} + 1`, updatedAt: sql`now()` })
    .where(eq(jobEntry.id, row.id))
    .returning();
  if (back === undefined) throw new ApiError('not_found');
  return back;
}
