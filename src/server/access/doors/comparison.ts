import { and, eq, isNull } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { capture, comparison, membership } from '../../db/schema.ts';
import { captureVisible, memberOf } from '../conditions.ts';
import type { Door } from '../door.ts';

export type ComparisonRecord = typeof comparison.$inferSelect;

/** A comparison, which is seen by whoever sees its capture. */
export const comparisonDoor: Door<ComparisonRecord> = {
  find: (person, thingId) =>
    db()
      .select({ thing: comparison, role: membership.role, madeBy: comparison.createdBy })
      .from(comparison)
      .innerJoin(capture, eq(capture.id, comparison.captureId))
      .innerJoin(membership, memberOf(person, capture.workshopId))
      .where(
        and(
          eq(comparison.id, thingId),
          isNull(capture.deletedAt),
          captureVisible(person.personId, membership.role),
        ),
      ),
};
