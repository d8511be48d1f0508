import { and, desc, eq, gt, isNull, sql } from 'drizzle-orm';
import type { PersonCaller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { invitation, person } from '../../db/schema.ts';
import { decodeTimeCursor, page } from '../../http/cursor.ts';
import { olderThan, timeKey } from '../../http/keyset.ts';

/** Invitations of the current workshop that can still be taken, newest first. */
export async function listInvitations(
  caller: PersonCaller,
  query: { limit: number; cursor?: string | undefined },
) {
  const rows = await db()
    .select({
      id: invitation.id,
      email: invitation.email,
      role: invitation.role,
      invitedBy: person.name,
      createdAt: invitation.createdAt,
      expiresAt: invitation.expiresAt,
      key: timeKey(invitation.createdAt),
    })
    .from(invitation)
    .innerJoin(person, eq(person.id, invitation.invitedBy))
    .where(
      and(
        eq(invitation.workshopId, caller.workshopId),
        isNull(invitation.acceptedAt),
        isNull(invitation.withdrawnAt),
        gt(invitation.expiresAt, sql`now()`),
        olderThan(invitation.createdAt, invitation.id, decodeTimeCursor(query.cursor)),
      ),
    )
    .orderBy(desc(invitation.createdAt), desc(invitation.id))
    .limit(query.limit + 1);
  const { items, nextCursor } = page(rows, query.limit, (row) => row);
  return {
    items: items.map(({ key: _key, createdAt, expiresAt, ...row }) => ({
      ...row,
      createdAt: createdAt.toISOString(),
      expiresAt: expiresAt.toISOString(),
    })),
    nextCursor,
  };
}
