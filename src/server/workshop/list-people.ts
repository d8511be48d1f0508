import { and, asc, eq } from 'drizzle-orm';
import type { PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { membership, person } from '../db/schema.ts';
import { decodeTimeCursor, page } from '../http/cursor.ts';
import { newerThan, timeKey } from '../http/keyset.ts';

/** People of the current workshop, in the order in which they came. */
export async function listPeople(
  caller: PersonCaller,
  query: { limit: number; cursor?: string | undefined },
) {
  const after = decodeTimeCursor(query.cursor);
  const rows = await db()
    .select({
      id: person.id,
      name: person.name,
      email: person.email,
      role: membership.role,
      since: membership.createdAt,
      key: timeKey(membership.createdAt),
    })
    .from(membership)
    .innerJoin(person, eq(person.id, membership.personId))
    .where(
      and(
        eq(membership.workshopId, caller.workshopId),
        newerThan(membership.createdAt, membership.personId, after),
      ),
    )
    .orderBy(asc(membership.createdAt), asc(membership.personId))
    .limit(query.limit + 1);
  const { items, nextCursor } = page(rows, query.limit, (row) => row);
  return {
    items: items.map(({ key: _key, since, ...rest }) => ({ ...rest, since: since.toISOString() })),
    nextCursor,
  };
}
