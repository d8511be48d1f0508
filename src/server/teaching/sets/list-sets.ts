import { and, desc, eq, isNull } from 'drizzle-orm';
import { type PersonCaller, setVisible } from '../../access.ts';
import { db } from '../../db/client.ts';
import { teachingSet } from '../../db/schema.ts';
import { decodeTimeCursor, page } from '../../http/cursor.ts';
import { olderThan, timeKey } from '../../http/keyset.ts';
import { setRows } from './set-rows.ts';

/** Sets of the current workshop that the caller sees, newest first. */
export async function listSets(
  caller: PersonCaller,
  query: { readonly limit: number; readonly cursor?: string | undefined },
) {
  const after = decodeTimeCursor(query.cursor);
  const rows = await db()
    .select({ id: teachingSet.id, key: timeKey(teachingSet.createdAt) })
    .from(teachingSet)
    .where(
      and(
        eq(teachingSet.workshopId, caller.workshopId),
        isNull(teachingSet.deletedAt),
        setVisible(caller.personId, caller.role),
        olderThan(teachingSet.createdAt, teachingSet.id, after),
      ),
    )
    .orderBy(desc(teachingSet.createdAt), desc(teachingSet.id))
    .limit(query.limit + 1);
  const { items, nextCursor } = page(rows, query.limit, (row) => row);
  const found = await setRows(
    items.map(({ id }) => id),
    caller,
    caller.role,
  );
  return { items: items.flatMap(({ id }) => found.get(id) ?? []), nextCursor };
}
