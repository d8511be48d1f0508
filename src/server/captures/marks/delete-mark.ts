import { and, eq, isNull, sql } from 'drizzle-orm';
import type { MarkRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { mark } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';

/** Takes a mark away as it was opened; a change in between is 412. It can be brought back for 30 days. */
export async function deleteMark(row: MarkRecord): Promise<void> {
  const [gone] = await db()
    .update(mark)
    .set({ deletedAt: sql`now()`, edition: sql`${mark.edition} + 1` })
    .where(and(eq(mark.id, row.id), eq(mark.edition, row.edition), isNull(mark.deletedAt)))
    .returning({ id: mark.id });
  if (gone === undefined) throw new ApiError('stale');
}
