import { and, eq, not, sql } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { knownGood, membership } from '../../db/schema.ts';
import { memberOf } from '../conditions.ts';
import type { Door } from '../door.ts';
import { madeFromWithheld } from '../teaching-conditions.ts';

export type KnownGoodRecord = typeof knownGood.$inferSelect;

/** A known-good of a workshop that the person belongs to; not there for a learner while it would give an exercise away. */
export const knownGoodDoor: Door<KnownGoodRecord> = {
  find: (person, knownGoodId) =>
    db()
      .select({ thing: knownGood, role: membership.role, madeBy: knownGood.createdBy })
      .from(knownGood)
      .innerJoin(membership, memberOf(person, knownGood.workshopId))
      .where(
        and(
          eq(knownGood.id, knownGoodId),
          not(madeFromWithheld(sql`${knownGood.captureId}`, person.personId, membership.role)),
        ),
      ),
};
