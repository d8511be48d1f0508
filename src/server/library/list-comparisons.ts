import { and, desc, eq, isNull } from 'drizzle-orm';
import type { z } from 'zod';
import type { ComparisonListRowJson, libraryEndpoints } from '../../contract/areas/library.ts';
import { captureVisible, type PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { capture, comparison, membership } from '../db/schema.ts';
import { decodeTimeCursor, page } from '../http/cursor.ts';
import { olderThan, timeKey } from '../http/keyset.ts';

type Query = z.infer<(typeof libraryEndpoints)['comparisons.list']['query']>;

/** Saved comparisons of the current workshop, newest first; those of hidden captures are left out. */
export async function listComparisons(caller: PersonCaller, query: Query) {
  const after = decodeTimeCursor(query.cursor);
  const rows = await db()
    .select({ row: comparison, title: capture.title, key: timeKey(comparison.createdAt) })
    .from(comparison)
    .innerJoin(capture, eq(capture.id, comparison.captureId))
    .innerJoin(
      membership,
      and(eq(membership.workshopId, capture.workshopId), eq(membership.personId, caller.personId)),
    )
    .where(
      and(
        eq(comparison.workshopId, caller.workshopId),
        isNull(capture.deletedAt),
        captureVisible(caller.personId, membership.role),
        query.captureId ? eq(comparison.captureId, query.captureId) : undefined,
        olderThan(comparison.createdAt, comparison.id, after),
      ),
    )
    .orderBy(desc(comparison.createdAt), desc(comparison.id))
    .limit(query.limit + 1);
  const { items, nextCursor } = page(rows, query.limit, ({ key, row }) => ({ key, id: row.id }));
  return { items: items.map(({ row, title }) => rowJson(row, title)), nextCursor };
}

function rowJson(row: typeof comparison.$inferSelect, title: string): ComparisonListRowJson {
  const { here, other, rows = [], alignment } = row.result ?? {};
  return {
    id: row.id,
    captureId: row.captureId,
    status: row.status,
    here: here ? `${title}, ${here.name}` : title,
    circuit: here?.circuit ?? null,
    other: other?.title ?? '',
    outside: rows.filter(({ verdict }) => verdict === 'outside').length,
    rows: rows.length,
    by: alignment?.by ?? '',
    createdAt: row.createdAt.toISOString(),
  };
}
