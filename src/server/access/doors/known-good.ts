import { eq } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { knownGood, membership } from '../../db/schema.ts';
import { memberOf } from '../conditions.ts';
import type { Door } from '../door.ts';

export type KnownGoodRecord = typeof knownGood.$inferSelect;

/** A known-good of a workshop that the person belongs to. */
export const knownGoodDoor: Door<KnownGoodRecord> = {
  find: (person, knownGoodId) =>
    db()
      .select({ thing: knownGood, role: membership.role, madeBy: knownGood.createdBy })
      .from(knownGood)
      .innerJoin(membership, memberOf(person, knownGood.workshopId))
      .where(eq(knownGood.id, knownGoodId)),
};
