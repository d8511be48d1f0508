import { and, eq, exists } from 'drizzle-orm';
import { db } from '../db/client.ts';
import { membership, person } from '../db/schema.ts';
import { ApiError } from '../errors.ts';

/** Makes another of the person's workshops the current one; one that they do not belong to does not exist. */
export async function switchWorkshop(personId: string, workshopId: string): Promise<void> {
  const belongs = db()
    .select({ one: membership.personId })
    .from(membership)
    .where(and(eq(membership.personId, personId), eq(membership.workshopId, workshopId)));
  const changed = await db()
    .update(person)
    .set({ currentWorkshopId: workshopId })
    .where(and(eq(person.id, personId), exists(belongs)))
    .returning({ id: person.id });
  if (changed.length === 0) throw new ApiError('not_found');
}
