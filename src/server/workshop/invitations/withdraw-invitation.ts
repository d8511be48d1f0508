import { and, eq, isNull, sql } from 'drizzle-orm';
import type { Caller, InvitationRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { invitation } from '../../db/schema.ts';
import { auditedBy, recordAudit } from '../audit.ts';

/** Withdraws an invitation; its link then says so. */
export const withdrawInvitation = (caller: Caller, row: InvitationRecord, address: string): Promise<void> =>
  db().transaction(async (tx) => {
    const gone = await tx
      .update(invitation)
      .set({ withdrawnAt: sql`now()` })
      .where(and(eq(invitation.id, row.id), isNull(invitation.acceptedAt), isNull(invitation.withdrawnAt)))
      .returning({ id: invitation.id });
    if (gone.length === 0) return;
    const entry = { ...auditedBy(caller, row.workshopId, address), subject: row.email };
    await recordAudit({ ...entry, action: 'invitation withdrawn' }, tx);
  });
