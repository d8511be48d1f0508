import { and, isNotNull, lte, sql } from 'drizzle-orm';
import { db } from '../db/client.ts';
import { workshop } from '../db/schema.ts';
import { removeWorkshop } from './remove-workshop.ts';

/** Removes the workshops whose time of grace is over. */
export async function endDueWorkshops(): Promise<number> {
  const due = await db()
    .select({ id: workshop.id })
    .from(workshop)
    .where(and(isNotNull(workshop.endsAt), lte(workshop.endsAt, sql`now()`)))
    .limit(20);
  for (const { id } of due) await removeWorkshop(id);
  return due.length;
}
