import { and, asc, eq, isNull } from 'drizzle-orm';
import type { WebhookJson } from '../../../contract/areas/owner.ts';
import type { PersonCaller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { person, webhook } from '../../db/schema.ts';
import { CAPTURE_MEASURED } from './queue-webhooks.ts';

/** The addresses of the current workshop, without their keys. */
export async function listWebhooks(caller: PersonCaller): Promise<WebhookJson[]> {
  const rows = await db()
    .select({ id: webhook.id, url: webhook.url, createdBy: person.name, createdAt: webhook.createdAt })
    .from(webhook)
    .innerJoin(person, eq(person.id, webhook.createdBy))
    .where(and(eq(webhook.workshopId, caller.workshopId), isNull(webhook.deletedAt)))
    .orderBy(asc(webhook.createdAt), asc(webhook.id));
  return rows.map((row) => ({ ...row, events: [CAPTURE_MEASURED], createdAt: row.createdAt.toISOString() }));
}
