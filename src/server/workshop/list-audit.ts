import { and, desc, eq } from 'drizzle-orm';
import type { PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { audit } from '../db/schema.ts';
import { decodeTimeCursor, page } from '../http/cursor.ts';
import { olderThan, timeKey } from '../http/keyset.ts';

/** What happened in the current workshop, newest first. */
export async function listAudit(caller: PersonCaller, query: { limit: number; cursor?: string | undefined }) {
  const before = decodeTimeCursor(query.cursor);
  const rows = await db()
    .select({
      id: audit.id,
      at: audit.at,
      who: audit.who,
      action: audit.action,
      subject: audit.subject,
      address: audit.address,
      key: timeKey(audit.at),
    })
    .from(audit)
    .where(and(eq(audit.workshopId, caller.workshopId), olderThan(audit.at, audit.id, before)))
    .orderBy(desc(audit.at), desc(audit.id))
    .limit(query.limit + 1);
  const { items, nextCursor } = page(rows, query.limit, (row) => row);
  return {
    items: items.map(({ key: _key, at, ...rest }) => ({ ...rest, at: at.toISOString() })),
    nextCursor,
  };
}
