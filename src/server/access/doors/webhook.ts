import { and, eq, isNull } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { membership, webhook } from '../../db/schema.ts';
import { memberOf } from '../conditions.ts';
import type { Door } from '../door.ts';

export type WebhookRecord = typeof webhook.$inferSelect;

/** An address that is told of events. */
export const webhookDoor: Door<WebhookRecord> = {
  find: (person, thingId) =>
    db()
      .select({ thing: webhook, role: membership.role, madeBy: webhook.createdBy })
      .from(webhook)
      .innerJoin(membership, memberOf(person, webhook.workshopId))
      .where(and(eq(webhook.id, thingId), isNull(webhook.deletedAt))),
};
