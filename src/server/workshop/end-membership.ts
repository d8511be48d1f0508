import { and, eq } from 'drizzle-orm';
import type { Executor } from '../db/client.ts';
import { membership, person, token } from '../db/schema.ts';
import { ApiError } from '../errors.ts';

/** The owners of a workshop, locked, so that two who go at once do not leave it without one. */
export async function lockOwners(tx: Executor, workshopId: string): Promise<string[]> {
  const owners = await tx
    .select({ personId: membership.personId })
    .from(membership)
    .where(and(eq(membership.workshopId, workshopId), eq(membership.role, 'owner')))
    .orderBy(membership.personId)
    .for('update');
  return owners.map((owner) => owner.personId);
}

/** Takes a person out of a workshop, their tokens for it with them. What they made stays, signed. The last owner cannot go. */
export async function endMembership(tx: Executor, workshopId: string, personId: string): Promise<void> {
  const owners = await lockOwners(tx, workshopId);
  if (owners.length === 1 && owners[0] === personId)
    throw new ApiError('conflict', {
      message: 'A workshop keeps at least one owner.',
      hint: 'Make somebody else an owner first, or have the workshop deleted.',
    });
  const gone = await tx
    .delete(membership)
    .where(and(eq(membership.workshopId, workshopId), eq(membership.personId, personId)))
    .returning({ personId: membership.personId });
  if (gone.length === 0) throw new ApiError('not_found');
  await tx.delete(token).where(and(eq(token.workshopId, workshopId), eq(token.personId, personId)));
  await tx
    .update(person)
    .set({ currentWorkshopId: null })
    .where(and(eq(person.id, personId), eq(person.currentWorkshopId, workshopId)));
}
