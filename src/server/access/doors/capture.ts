import { and, eq, isNull } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { capture, membership } from '../../db/schema.ts';
import { captureVisible, memberOf, reachable } from '../conditions.ts';
import type { Door } from '../door.ts';

export type CaptureRecord = typeof capture.$inferSelect;

/** A capture; a share link opens its own capture only. */
export const captureDoor: Door<CaptureRecord> = {
  find: (person, captureId, { deleted }) =>
    db()
      .select({ thing: capture, role: membership.role, madeBy: capture.createdBy })
      .from(capture)
      .innerJoin(membership, memberOf(person, capture.workshopId))
      .where(
        and(
          eq(capture.id, captureId),
          reachable(capture.deletedAt, deleted),
          captureVisible(person.personId, membership.role),
        ),
      ),
  findShared: async (link, captureId) =>
    captureId !== link.captureId
      ? []
      : db()
          .select()
          .from(capture)
          .where(and(eq(capture.id, captureId), isNull(capture.deletedAt))),
};
