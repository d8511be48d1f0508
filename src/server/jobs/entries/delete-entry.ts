import { and, eq, isNull, sql } from 'drizzle-orm';
import type { JobEntryRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { jobEntry } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';

/** Takes a note or a reading away; it can be brought back for 30 days. */
export async function deleteEntry(row: JobEntryRecord): Promise<void> {
  if (row.kind === 'event')
    throw new ApiError('conflict', { message: 'This line says what happened; it stays.' });
  const [gone] = await db()
    .update(jobEntry)
    .set({ deletedAt: sql`now()`, edition: sql`${jobEntry.edition} + 1` })
    .where(and(eq(jobEntry.id, row.id), eq(jobEntry.edition, row.edition), isNull(jobEntry.deletedAt)))
    .returning({ id: jobEntry.id });
  if (gone === undefined) throw new ApiError('stale');
}
