import { and, eq, isNull, sql } from 'drizzle-orm';
import type { SetRecord } from '../../access.ts';
import type { Executor } from '../../db/client.ts';
import { teachingSet } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';

/** Raises a set's edition and sets fields, as it was opened; a change in between is 412. */
export async function changeSet(
  tx: Executor,
  row: SetRecord,
  fields: Partial<
    Pick<typeof teachingSet.$inferInsert, 'title' | 'intro' | 'state' | 'audience' | 'deletedAt'>
  >,
): Promise<SetRecord> {
  const [changed] = await tx
    .update(teachingSet)
    .set({ ...fields, edition: sql`${teachingSet.edition} + 1`, updatedAt: sql`now()` })
    .where(
      and(eq(teachingSet.id, row.id), eq(teachingSet.edition, row.edition), isNull(teachingSet.deletedAt)),
    )
    .returning();
  if (changed === undefined) throw new ApiError('stale');
  return { ...changed, heldRole: row.heldRole };
}
