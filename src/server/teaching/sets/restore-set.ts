import { eq, sql } from 'drizzle-orm';
import type { SetRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { teachingSet } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';

/** Brings a set back; one that is there stays as it is. */
export async function restoreSet(row: SetRecord): Promise<SetRecord> {
  if (row.deletedAt === null) return row;
  const [back] = await db()
    .update(teachingSet)
    .set({ deletedAt: null, edition: sql`${teachingSet.edition} + 1`, updatedAt: sql`now()` })
    .where(eq(teachingSet.id, row.id))
    .returning();
  if (back === undefined) throw new ApiError('not_found');
  return { ...back, heldRole: row.heldRole };
}
