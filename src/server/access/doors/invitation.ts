import { and, eq, isNull } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { invitation, membership } from '../../db/schema.ts';
import { memberOf } from '../conditions.ts';
import type { Door } from '../door.ts';

export type InvitationRecord = typeof invitation.$inferSelect;

/** An invitation that was neither taken nor withdrawn. */
export const invitationDoor: Door<InvitationRecord> = {
  find: (person, thingId) =>
    db()
      .select({ thing: invitation, role: membership.role, madeBy: invitation.invitedBy })
      .from(invitation)
      .innerJoin(membership, memberOf(person, invitation.workshopId))
      .where(and(eq(invitation.id, thingId), isNull(invitation.acceptedAt), isNull(invitation.withdrawnAt))),
};
