import { and, eq } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { membership, teachingSet } from '../../db/schema.ts';
import { memberOf, reachable } from '../conditions.ts';
import type { Door } from '../door.ts';
import { setVisible } from '../teaching-conditions.ts';

/** A set and the role that the caller holds in its workshop: what is shown of it depends on that. */
export type SetRecord = typeof teachingSet.$inferSelect & {
  readonly heldRole: typeof membership.$inferSelect.role;
};

/** A set: for instructors and owners of its workshop, and for whom it is set. */
export const setDoor: Door<SetRecord> = {
  find: async (person, thingId, { deleted }) => {
    const rows = await db()
      .select({ thing: teachingSet, role: membership.role, madeBy: teachingSet.createdBy })
      .from(teachingSet)
      .innerJoin(membership, memberOf(person, teachingSet.workshopId))
      .where(
        and(
          eq(teachingSet.id, thingId),
          reachable(teachingSet.deletedAt, deleted),
          setVisible(person.personId, membership.role),
        ),
      );
    return rows.map((row) => ({ ...row, thing: { ...row.thing, heldRole: row.role } }));
  },
};
