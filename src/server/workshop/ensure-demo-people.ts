import { and, eq } from 'drizzle-orm';
import type { PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { membership, person, workshop } from '../db/schema.ts';
import { newId } from '../ids.ts';
import { hashPassword } from '../session/password.ts';
import { DEMO_PASSWORD, DEMO_PEOPLE, DEMO_WORKSHOP } from './demo-people.ts';

/**
 * Makes the demo workshop and its people where they are missing, in one transaction.
 * @returns the people as callers, in the order of DEMO_PEOPLE, and whether the seeding had been finished before.
 */
export async function ensureDemoPeople(): Promise<{
  people: PersonCaller[];
  workshopId: string;
  finished: boolean;
}> {
  const passwordHash = await hashPassword(DEMO_PASSWORD);
  return db().transaction(async (tx) => {
    const [owner] = await tx
      .select({ workshopId: membership.workshopId, finished: workshop.demo })
      .from(person)
      .innerJoin(membership, and(eq(membership.personId, person.id), eq(membership.role, 'owner')))
      .innerJoin(workshop, eq(workshop.id, membership.workshopId))
      .where(eq(person.email, DEMO_PEOPLE[0]!.email));
    const workshopId = owner?.workshopId ?? newId();
    if (!owner)
      await tx.insert(workshop).values({ id: workshopId, name: DEMO_WORKSHOP, timeZone: 'Europe/Lisbon' });
    const people: PersonCaller[] = [];
    for (const { email, name, role } of DEMO_PEOPLE) {
      await tx
        .insert(person)
        .values({ id: newId(), email, name, passwordHash, currentWorkshopId: workshopId })
        .onConflictDoNothing({ target: person.email });
      const [row] = await tx.select({ id: person.id }).from(person).where(eq(person.email, email));
      await tx.insert(membership).values({ personId: row!.id, workshopId, role }).onConflictDoNothing();
      people.push({ kind: 'person', personId: row!.id, name, workshopId, role, via: 'session', scopes: [] });
    }
    return { people, workshopId, finished: owner?.finished ?? false };
  });
}
