import { and, eq, inArray } from 'drizzle-orm';
import type { Executor } from '../../db/client.ts';
import { membership, teachingSetPerson } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';

/** Replaces whom a set names. @throws ApiError invalid when somebody is not of the workshop. */
export async function writePeople(
  tx: Executor,
  setId: string,
  workshopId: string,
  people: readonly string[],
): Promise<void> {
  const wanted = [...new Set(people)];
  await tx.delete(teachingSetPerson).where(eq(teachingSetPerson.setId, setId));
  if (wanted.length === 0) return;
  const there = await tx
    .select({ id: membership.personId })
    .from(membership)
    .where(and(eq(membership.workshopId, workshopId), inArray(membership.personId, wanted)));
  if (there.length !== wanted.length)
    throw new ApiError('invalid', {
      details: [{ path: 'people', message: 'names somebody who is not in this workshop' }],
    });
  await tx.insert(teachingSetPerson).values(wanted.map((personId) => ({ setId, personId })));
}
