import { and, asc, eq, ne } from 'drizzle-orm';
import { db } from '../db/client.ts';
import { membership, person } from '../db/schema.ts';

/** Who may work on a workshop's jobs, by name; nothing else of them. */
export const listAssignable = (workshopId: string): Promise<{ id: string; name: string }[]> =>
  db()
    .select({ id: person.id, name: person.name })
    .from(membership)
    .innerJoin(person, eq(person.id, membership.personId))
    .where(and(eq(membership.workshopId, workshopId), ne(membership.role, 'learner')))
    .orderBy(asc(person.name), asc(person.id))
    .limit(500);
