import { and, eq, isNull, sql } from 'drizzle-orm';
import type { Caller, ShareLinkRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { capture, shareLink } from '../../db/schema.ts';
import { auditedBy, recordAudit } from '../../workshop/audit.ts';

/** Withdraws a link at once and for good; again is no fault. */
export async function withdrawLink(caller: Caller, row: ShareLinkRecord, address: string): Promise<void> {
  await db().transaction(async (tx) => {
    const [withdrawn] = await tx
      .update(shareLink)
      .set({ withdrawnAt: sql`now()` })
      .where(and(eq(shareLink.id, row.id), isNull(shareLink.withdrawnAt)))
      .returning({ captureId: shareLink.captureId });
    if (withdrawn === undefined) return;
    const [of] = await tx.select().from(capture).where(eq(capture.id, withdrawn.captureId));
    if (of === undefined) return;
    await recordAudit(
      { ...auditedBy(caller, of.workshopId, address), action: 'link withdrawn', subject: of.title },
      tx,
    );
  });
}
