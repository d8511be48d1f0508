import { and, eq, ne } from 'drizzle-orm';
import type { Executor } from '../db/client.ts';
import { membership, person } from '../db/schema.ts';
import { ApiError } from '../errors.ts';

/** The name of somebody who may work on the workshop's jobs; 422 when they are none of its people, or a learner. */
export async function checkAssignee(on: Executor, workshopId: string, personId: string): Promise<string> {
  const [found] = await on
    .select({ name: person.name })
    .from(membership)
    .innerJoin(person, eq(person.id, membership.personId))
    .where(
      and(
        eq(membership.workshopId, workshopId),
        eq(membership.personId, personId),
        ne(membership.role, 'learner'),
      ),
    );
  if (found !== undefined) return found.name;
  throw new ApiError('invalid', {
    details: [{ path: 'assigneeId', message: 'is nobody who works on this workshop’s jobs' }],
  });
}
