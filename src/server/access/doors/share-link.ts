import { and, eq, isNull } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { capture, membership, shareLink } from '../../db/schema.ts';
import { captureVisible, memberOf } from '../conditions.ts';
import type { Door } from '../door.ts';

export type ShareLinkRecord = typeof shareLink.$inferSelect;

/** A share link, through its capture. */
export const shareLinkDoor: Door<ShareLinkRecord> = {
  find: (person, thingId) =>
    db()
      .select({ thing: shareLink, role: membership.role, madeBy: capture.createdBy })
      .from(shareLink)
      .innerJoin(capture, eq(capture.id, shareLink.captureId))
      .innerJoin(membership, memberOf(person, capture.workshopId))
      .where(
        and(
          eq(shareLink.id, thingId),
          isNull(capture.deletedAt),
          captureVisible(person.personId, membership.role),
        ),
      ),
};
