import { and, eq, isNull } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { capture, mark, membership } from '../../db/schema.ts';
import { captureVisible, memberOf, reachable } from '../conditions.ts';
import type { Door } from '../door.ts';

export type MarkRecord = typeof mark.$inferSelect;

/** A mark, through its capture, whose maker is who counts for `own`. */
export const markDoor: Door<MarkRecord> = {
  find: (person, thingId, { deleted }) =>
    db()
      .select({ thing: mark, role: membership.role, madeBy: capture.createdBy })
      .from(mark)
      .innerJoin(capture, eq(capture.id, mark.captureId))
      .innerJoin(membership, memberOf(person, capture.workshopId))
      .where(
        and(
          eq(mark.id, thingId),
          isNull(capture.deletedAt),
          reachable(mark.deletedAt, deleted),
          captureVisible(person.personId, membership.role),
        ),
      ),
};
