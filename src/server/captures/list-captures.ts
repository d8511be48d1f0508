import { and, desc, eq, exists, getTableColumns, isNull, type SQL, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { CaptureRowJson, captureListQuery } from '../../contract/areas/captures.ts';
import type { Circuit } from '../../engine/circuit.ts';
import { captureVisible, type PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { capture, captureSignal, mark, measurement } from '../db/schema.ts';
import { decodeTimeCursor, page } from '../http/cursor.ts';
import { capturesJson } from './capture-json.ts';
import { HEADLINE_KEYS, headline, type PickedValues } from './headline.ts';

type Query = z.output<typeof captureListQuery>;

/** Newest first, a keyset page of the current workshop's captures that the caller may see. */
export async function listCaptures(caller: PersonCaller, query: Query) {
  const timeKey = sql<string>`to_char(${capture.createdAt} at time zone 'UTC', 'YYYY-MM-DD HH24:MI:SS.US') || '+00'`;
  const after = decodeTimeCursor(query.cursor);
  const rows = await db()
    .select({ thing: getTableColumns(capture), timeKey, summary: summaryColumns() })
    .from(capture)
    .leftJoin(measurement, eq(measurement.captureId, capture.id))
    .where(
      and(
        eq(capture.workshopId, caller.workshopId),
        isNull(capture.deletedAt),
        captureVisible(caller.personId, caller.role),
        after && sql`(${capture.createdAt}, ${capture.id}) < (${after.key}::timestamptz, ${after.id})`,
        ...filters(query),
      ),
    )
    .orderBy(desc(capture.createdAt), desc(capture.id))
    .limit(query.limit + 1);
  const cut = page(rows, query.limit, (row) => ({ key: row.timeKey, id: row.thing.id }));
  const json = await capturesJson(cut.items.map((row) => row.thing));
  const items = json.map(({ reading: _, ...item }, k): CaptureRowJson => {
    const { values, watch, bad, first, marks } = cut.items[k]!.summary;
    const texts = (values ?? []).map(({ signal, circuit, picked }) => ({
      signal,
      text: headline(circuit, picked ?? {}),
    }));
    return {
      ...item,
      headline: texts.filter(({ text }) => text !== ''),
      notices: { watch: Number(watch), bad: Number(bad), first },
      marks: Number(marks),
    };
  });
  return { items, nextCursor: cut.nextCursor };
}

function filters(query: Query): (SQL | undefined)[] {
  const { search, circuit, jobId, status } = query;
  // Trigram search: the title contains what was typed, whatever its case; % and _ are not wildcards.
  const pattern = search?.trim() && `%${search.trim().replace(/[\\%_]/g, '\\$&')}%`;
  return [
    pattern ? sql`${capture.title} ilike ${pattern}` : undefined,
    status && eq(capture.status, status),
    jobId === undefined ? undefined : eq(capture.jobId, jobId),
    circuit &&
      exists(
        db()
          .select({ one: sql`1` })
          .from(captureSignal)
          .where(and(eq(captureSignal.captureId, capture.id), eq(captureSignal.circuit, circuit))),
      ),
  ];
}

interface Picked {
  readonly signal: number;
  readonly circuit: Circuit;
  readonly picked: PickedValues | null;
}

/** Picked in the database, as whole measurements with all their evidence are large. */
function summaryColumns() {
  const keys = sql.join(
    HEADLINE_KEYS.map((key) => sql`${key}`),
    sql`, `,
  );
  const notices = sql`jsonb_path_query(${measurement.signals} || ${measurement.relations}, '$[*].notices[*]')`;
  const count = (severity: string) =>
    sql<number>`(select count(*)::int from ${notices} n where n->>'severity' = ${severity})`;
  return {
    values: sql<
      Picked[] | null
    >`(select jsonb_agg(jsonb_build_object('signal', s->'index', 'circuit', s->'circuit',
      'picked', (select jsonb_object_agg(v->>'key', v - 'evidence') from jsonb_array_elements(s->'values') v
        where v->>'key' in (${keys})))) from jsonb_array_elements(${measurement.signals}) s)`,
    watch: count('watch'),
    bad: count('bad'),
    first: sql<string | null>`(select n->>'text' from ${notices} n where n->>'severity' in ('bad', 'watch')
      order by n->>'severity' = 'bad' desc limit 1)`,
    marks: sql<number>`(select count(*)::int from ${mark} where ${mark.captureId} = ${capture.id}
      and ${mark.deletedAt} is null)`,
  };
}
