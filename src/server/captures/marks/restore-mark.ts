import { eq, sql } from 'drizzle-orm';
import type { MarkRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { mark } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';

/** Brings a mark back; one that is there stays as it is. */
export async function restoreMark(row: MarkRecord): Promise<MarkRecord> {
  if (row.deletedAt === null) return row;
  const [back] = await db()
    .update(mark)
    .set({ deletedAt: null, edition: sql`${mark.edition} + 1`, updatedAt: sql`now()` })
    .where(eq(mark.id, row.id))
    .returning();
  if (back === undefined) throw new ApiError('not_found');
  return back;
}
