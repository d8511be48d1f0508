import { and, eq, isNull } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { capture, membership } from '../../db/schema.ts';
import { captureVisible, memberOf, reachable } from '../conditions.ts';
import type { Door } from '../door.ts';

export type CaptureRecord = typeof capture.$inferSelect;

/** A capture; a share link opens its own capture only. */
export const captureDoor: Door<CaptureRecord> = {
  find: async (person, captureId, { deleted }) => {
    const rows = await db()
      .select({ thing: capture, role: membership.role, madeBy: capture.createdBy })
      .from(capture)
      .innerJoin(membership, memberOf(person, capture.workshopId))
      .where(
        and(
          eq(capture.id, captureId),
          reachable(capture.deletedAt, deleted),
          captureVisible(person.personId, membership.role),
        ),
      );
    // What a learner finds here and did not make is set for them: the condition lets nothing else through.
    return rows.map((row) => ({ ...row, setFor: true }));
  },
  findShared: async (link, captureId) =>
    captureId !== link.captureId
      ? []
      : db()
          .select()
          .from(capture)
          .where(and(eq(capture.id, captureId), isNull(capture.deletedAt))),
};
