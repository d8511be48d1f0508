import { and, desc, eq, exists, ilike, or, type SQL, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { KnownGoodRowJson, libraryEndpoints } from '../../contract/areas/library.ts';
import type { PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { knownGood, knownGoodSignal, person } from '../db/schema.ts';
import { decodeTimeCursor, page } from '../http/cursor.ts';

type Query = z.infer<(typeof libraryEndpoints)['knownGoods.list']['query']>;

/** `%` and `_` mean themselves in what a person typed. */
const like = (text: string) => `%${text.replace(/[\\%_]/g, '\\$&')}%`;

const words = (text: string): SQL | undefined =>
  and(
    ...text
      .split(/\s+/)
      .filter(Boolean)
      .slice(0, 8)
      .map((word) =>
        or(
          ilike(knownGood.make, like(word)),
          ilike(knownGood.model, like(word)),
          ilike(knownGood.code, like(word)),
          ilike(knownGood.note, like(word)),
          ilike(knownGood.condition, like(word)),
        ),
      ),
  );

/** PostgreSQL's own text of the time: JavaScript's milliseconds would lose its microseconds. */
const timeKey = sql<string>`to_char(${knownGood.createdAt} at time zone 'UTC', 'YYYY-MM-DD HH24:MI:SS.US') || '+00'`;

/** Known-goods of the current workshop, newest first. `engine` and `search` are words that all must be found. */
export async function listKnownGoods(caller: PersonCaller, query: Query) {
  const after = decodeTimeCursor(query.cursor);
  const withCircuit = query.circuit
    ? exists(
        db()
          .select({ one: sql`1` })
          .from(knownGoodSignal)
          .where(
            and(eq(knownGoodSignal.knownGoodId, knownGood.id), eq(knownGoodSignal.circuit, query.circuit)),
          ),
      )
    : undefined;
  const rows = await db()
    .select({ good: knownGood, author: person.name, key: timeKey })
    .from(knownGood)
    .innerJoin(person, eq(person.id, knownGood.createdBy))
    .where(
      and(
        eq(knownGood.workshopId, caller.workshopId),
        query.state ? eq(knownGood.state, query.state) : undefined,
        query.condition ? eq(knownGood.condition, query.condition) : undefined,
        query.search ? words(query.search) : undefined,
        query.engine ? words(query.engine) : undefined,
        withCircuit,
        after && sql`(${knownGood.createdAt}, ${knownGood.id}) < (${after.key}::timestamptz, ${after.id})`,
      ),
    )
    .orderBy(desc(knownGood.createdAt), desc(knownGood.id))
    .limit(query.limit + 1);
  const { items: found, nextCursor } = page(rows, query.limit, (row) => ({ key: row.key, id: row.good.id }));
  const ids = found.map((row) => row.good.id);
  const signals =
    ids.length === 0
      ? []
      : await db()
          .select()
          .from(knownGoodSignal)
          .where(sql`${knownGoodSignal.knownGoodId} = any(${sql.param(ids)})`)
          .orderBy(knownGoodSignal.index);
  const items: KnownGoodRowJson[] = found.map(({ good, author }) => ({
    id: good.id,
    state: good.state,
    engine: {
      make: good.make,
      model: good.model,
      code: good.code,
      year: good.year,
      cylinders: good.cylinders,
    },
    condition: good.condition,
    note: good.note,
    provenance: good.provenance,
    captureId: good.captureId,
    fromS: good.fromS,
    toS: good.toS,
    engineVersion: good.engineVersion,
    signals: signals
      .filter((signal) => signal.knownGoodId === good.id)
      .map(({ index, name, circuit, unit }) => ({ index, name, circuit, unit })),
    createdBy: { id: good.createdBy, name: author },
    createdAt: good.createdAt.toISOString(),
    publishedAt: good.publishedAt?.toISOString() ?? null,
  }));
  return { items, nextCursor };
}
