import { and, eq, isNull, sql } from 'drizzle-orm';
import type { Caller, WebhookRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { webhook } from '../../db/schema.ts';
import { auditedBy, recordAudit } from '../audit.ts';

/** Tells the address no more, of what is on its way neither. */
export const deleteWebhook = (caller: Caller, row: WebhookRecord, from: string): Promise<void> =>
  db().transaction(async (tx) => {
    const gone = await tx
      .update(webhook)
      .set({ deletedAt: sql`now()`, sealedKey: '' })
      .where(and(eq(webhook.id, row.id), isNull(webhook.deletedAt)))
      .returning({ id: webhook.id });
    if (gone.length === 0) return;
    const entry = { ...auditedBy(caller, row.workshopId, from), subject: new URL(row.url).origin };
    await recordAudit({ ...entry, action: 'webhook ended' }, tx);
  });
