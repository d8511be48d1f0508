import { and, desc, eq, sql } from 'drizzle-orm';
import type { DeliveryJson } from '../../../contract/areas/owner.ts';
import { db } from '../../db/client.ts';
import { webhookDelivery } from '../../db/schema.ts';
import { decodeTimeCursor, page } from '../../http/cursor.ts';
import { olderThan, timeKey } from '../../http/keyset.ts';

/** What was sent to an address, newest first. */
export async function listDeliveries(
  webhookId: string,
  query: { limit: number; cursor?: string | undefined },
): Promise<{ items: DeliveryJson[]; nextCursor: string | null }> {
  const rows = await db()
    .select({
      id: webhookDelivery.id,
      event: webhookDelivery.event,
      captureId: sql<string | null>`${webhookDelivery.payload} #>> '{capture,id}'`,
      state: webhookDelivery.state,
      tries: webhookDelivery.tries,
      status: webhookDelivery.status,
      error: webhookDelivery.error,
      createdAt: webhookDelivery.createdAt,
      triedAt: webhookDelivery.triedAt,
      key: timeKey(webhookDelivery.createdAt),
    })
    .from(webhookDelivery)
    .where(
      and(
        eq(webhookDelivery.webhookId, webhookId),
        olderThan(webhookDelivery.createdAt, webhookDelivery.id, decodeTimeCursor(query.cursor)),
      ),
    )
    .orderBy(desc(webhookDelivery.createdAt), desc(webhookDelivery.id))
    .limit(query.limit + 1);
  const { items, nextCursor } = page(rows, query.limit, (row) => row);
  return {
    items: items.map(({ key: _key, createdAt, triedAt, ...row }) => ({
      ...row,
      createdAt: createdAt.toISOString(),
      triedAt: triedAt?.toISOString() ?? null,
    })),
    nextCursor,
  };
}
