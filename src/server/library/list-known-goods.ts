import { and, asc, desc, eq, exists, ilike, inArray, type SQL, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { KnownGoodRowJson, libraryEndpoints } from '../../contract/areas/library.ts';
import { OPENERS, type PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { capture, captureSignal, knownGood, knownGoodSignal, measurement, person } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { decodeCursor, page } from '../http/cursor.ts';
import { timeKey } from '../http/keyset.ts';
import { engineJson } from './known-good-json.ts';
import { mutable } from './mutable.ts';
import { sheetValues } from './sheet-values.ts';

type Query = z.infer<(typeof libraryEndpoints)['knownGoods.list']['query']>;

/** `%` and `_` mean themselves in what a person typed. */
const like = (text: string) => `%${text.replace(/[\\%_]/g, '\\$&')}%`;
const wordsOf = (text: string) => text.toLowerCase().split(/\s+/).filter(Boolean).slice(0, 8);

/** How alike two words must be when a typing mistake is forgiven: the share of three-letter pieces (pg_trgm). Our choice. */
const FORGIVING = 0.4;

type Match = 'exact' | 'forgiving';

/** Every word must occur. `forgiving`: or something like it. Both use the trigram index. */
const matches = (text: string, match: Match): SQL | undefined =>
  and(
    ...wordsOf(text).map((word) =>
      match === 'exact' ? ilike(knownGood.words, like(word)) : sql`${word} <% ${knownGood.words}`,
    ),
  );

/**
 * Known-goods of the current workshop, newest first, or with `fit` those that fit a capture best. `engine` and `search` are
 * words that all must be found; where nothing has them as typed, typing mistakes are forgiven. Keyset pages: the cursor keeps
 * how the first page was found.
 */
export async function listKnownGoods(caller: PersonCaller, query: Query) {
  const after = positionOf(query.cursor);
  const fit = query.fit === undefined ? null : await fitOf(caller, query.fit);
  const typed = `${query.search ?? ''} ${query.engine ?? ''}`;
  const first = after?.match ?? 'exact';
  let rows = await find(caller, query, typed, first, fit, after);
  let match = first;
  if (rows.length === 0 && after === null && wordsOf(typed).length > 0) {
    match = 'forgiving';
    rows = await find(caller, query, typed, match, fit, after);
  }
  const { items: found, nextCursor } = page(rows, query.limit, (row) => ({
    key: `${match === 'exact' ? 'e' : 'f'}${row.fit} ${row.key}`,
    id: row.good.id,
  }));
  return { items: await withSignals(found), nextCursor };
}

interface After {
  readonly match: Match;
  readonly fit: number;
  readonly key: string;
  readonly id: string;
}

function positionOf(cursor: string | undefined): After | null {
  const position = decodeCursor(cursor);
  if (position === undefined) return null;
  const parts = /^([ef])(-?\d+) (\d{4}-\d\d-\d\d \d\d:\d\d:\d\d(?:\.\d+)?\+00)$/.exec(position.key);
  if (!parts)
    throw new ApiError('invalid', { details: [{ path: 'cursor', message: 'is not a cursor of this list' }] });
  return {
    match: parts[1] === 'f' ? 'forgiving' : 'exact',
    fit: Number(parts[2]),
    key: parts[3]!,
    id: position.id,
  };
}

/** How well a known-good fits the capture at hand: same wheel 4, same cylinders 2, a circuit that both have 1. Our choice. */
async function fitOf(caller: PersonCaller, captureId: string): Promise<SQL<number>> {
  const row = await OPENERS.capture(caller, 'captures.get', captureId);
  const [kept] = await db()
    .select({ wheel: measurement.wheel })
    .from(measurement)
    .innerJoin(capture, eq(capture.id, measurement.captureId))
    .where(eq(measurement.captureId, row.id));
  const signals = await db()
    .selectDistinct({ circuit: captureSignal.circuit })
    .from(captureSignal)
    .where(eq(captureSignal.captureId, row.id));
  const circuits = signals.map(({ circuit }) => circuit);
  const pattern = kept?.wheel?.pattern ?? null;
  return sql<number>`(
    case when ${knownGood.wheelPattern} = ${pattern} then 4 else 0 end
    + case when ${knownGood.cylinders} = ${row.cylinders} then 2 else 0 end
    + (select count(distinct s.circuit) from known_good_signal s
        where s.known_good_id = ${knownGood.id} and s.circuit = any(${sql.param(circuits)}::text[]))
  )::int`;
}

async function find(
  caller: PersonCaller,
  query: Query,
  typed: string,
  match: Match,
  fit: SQL<number> | null,
  after: After | null,
) {
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
  const rank = fit ?? sql<number>`0`;
  const older =
    after === null
      ? undefined
      : sql`(${knownGood.createdAt}, ${knownGood.id}) < (${after.key}::timestamptz, ${after.id})`;
  return db().transaction(async (tx) => {
    if (match === 'forgiving')
      await tx.execute(
        sql`select set_config('pg_trgm.word_similarity_threshold', ${String(FORGIVING)}, true)`,
      );
    return tx
      .select({ good: knownGood, author: person.name, key: timeKey(knownGood.createdAt), fit: rank })
      .from(knownGood)
      .innerJoin(person, eq(person.id, knownGood.createdBy))
      .where(
        and(
          eq(knownGood.workshopId, caller.workshopId),
          query.state ? eq(knownGood.state, query.state) : undefined,
          query.condition ? eq(knownGood.condition, query.condition) : undefined,
          query.wheel ? eq(knownGood.wheelPattern, query.wheel) : undefined,
          matches(typed, match),
          withCircuit,
          after === null
            ? undefined
            : fit === null
              ? older
              : sql`(${rank} < ${after.fit} or (${rank} = ${after.fit} and ${older}))`,
        ),
      )
      .orderBy(...(fit === null ? [] : [desc(rank)]), desc(knownGood.createdAt), desc(knownGood.id))
      .limit(query.limit + 1);
  });
}

async function withSignals(
  found: readonly { readonly good: typeof knownGood.$inferSelect; readonly author: string }[],
): Promise<KnownGoodRowJson[]> {
  const ids = found.map((row) => row.good.id);
  const signals =
    ids.length === 0
      ? []
      : await db()
          .select({
            knownGoodId: knownGoodSignal.knownGoodId,
            index: knownGoodSignal.index,
            name: knownGoodSignal.name,
            circuit: knownGoodSignal.circuit,
            unit: knownGoodSignal.unit,
            portrait: knownGoodSignal.portrait,
          })
          .from(knownGoodSignal)
          .where(inArray(knownGoodSignal.knownGoodId, ids))
          .orderBy(asc(knownGoodSignal.index));
  return found.map(({ good, author }) => ({
    id: good.id,
    state: good.state,
    engine: engineJson(good),
    condition: good.condition,
    note: good.note,
    provenance: good.provenance,
    instrument: good.instrument,
    probe: good.probe,
    confirmed: good.confirmed,
    wheelPattern: good.wheelPattern,
    version: good.version,
    supersedes: good.supersedes,
    supersededBy: good.supersededBy,
    captureId: good.captureId,
    fromS: good.fromS,
    toS: good.toS,
    engineVersion: good.engineVersion,
    signals: signals
      .filter((signal) => signal.knownGoodId === good.id)
      .map(({ index, name, circuit, unit, portrait }) => ({
        index,
        name,
        circuit,
        unit,
        portrait: portrait && mutable(portrait),
        values: sheetValues(good.findings, index),
      })),
    createdBy: { id: good.createdBy, name: author },
    createdAt: good.createdAt.toISOString(),
    publishedAt: good.publishedAt?.toISOString() ?? null,
  }));
}
