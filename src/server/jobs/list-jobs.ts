import { and, desc, eq, getTableColumns, isNull, or, type SQL, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { JobRowJson, jobListQuery } from '../../contract/areas/jobs.ts';
import type { PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { capture, job, jobEntry, jobPhoto } from '../db/schema.ts';
import { decodeTimeCursor, page } from '../http/cursor.ts';
import { olderThan, timeKey } from '../http/keyset.ts';
import { jobsJson } from './job-json.ts';

type Query = Pick<z.output<typeof jobListQuery>, 'limit'> & Partial<z.output<typeof jobListQuery>>;

/** Newest first, a keyset page of the current workshop's jobs. */
export async function listJobs(
  caller: PersonCaller,
  query: Query,
): Promise<{ items: JobRowJson[]; nextCursor: string | null }> {
  const assignee = query.assignee === 'me' ? caller.personId : query.assignee;
  const rows = await db()
    .select({ thing: getTableColumns(job), key: timeKey(job.createdAt), counts: COUNTS })
    .from(job)
    .where(
      and(
        eq(job.workshopId, caller.workshopId),
        isNull(job.deletedAt),
        query.state && eq(job.state, query.state),
        assignee === undefined ? undefined : eq(job.assigneeId, assignee),
        ...words(query.search ?? ''),
        olderThan(job.createdAt, job.id, decodeTimeCursor(query.cursor)),
      ),
    )
    .orderBy(desc(job.createdAt), desc(job.id))
    .limit(query.limit + 1);
  const cut = page(rows, query.limit, (row) => ({ key: row.key, id: row.thing.id }));
  const json = await jobsJson(cut.items.map((row) => row.thing));
  const items = json.map((item, k) => ({ ...item, ...cut.items[k]!.counts }));
  return { items, nextCursor: cut.nextCursor };
}

const COUNTS = {
  captures: sql<number>`(select count(*)::int from ${capture} where ${capture.jobId} = ${job.id}
    and ${capture.deletedAt} is null)`,
  photos: sql<number>`(select count(*)::int from ${jobPhoto} where ${jobPhoto.jobId} = ${job.id}
    and ${jobPhoto.deletedAt} is null)`,
  entries: sql<number>`(select count(*)::int from ${jobEntry} where ${jobEntry.jobId} = ${job.id}
    and ${jobEntry.deletedAt} is null and ${jobEntry.kind} <> 'event')`,
};

/** `%` and `_` mean themselves in what a person typed. */
const like = (text: string) => `%${text.replace(/[\\%_]/g, '\\$&')}%`;

/** Every word must be found in the job or in something that belongs to it. */
function words(search: string): (SQL | undefined)[] {
  const typed = search.split(/\s+/).filter(Boolean).slice(0, 8);
  return typed.map((word) => {
    const bare = /^[\p{L}\p{N}.-]+$/u.test(word) ? word.replace(/[.-]/g, '') : word;
    const pattern = like(word);
    return or(
      sql`${job.search} ilike ${pattern}`,
      // KV-418-T finds the plate KV 418 T.
      bare.length >= 3 && bare !== word ? sql`${job.search} ilike ${like(bare)}` : undefined,
      sql`exists (select 1 from ${jobEntry} where ${jobEntry.jobId} = ${job.id} and ${jobEntry.deletedAt} is null
        and ${jobEntry.kind} <> 'event' and (${jobEntry.text} ilike ${pattern} or ${jobEntry.what} ilike ${pattern}))`,
      sql`exists (select 1 from ${jobPhoto} where ${jobPhoto.jobId} = ${job.id} and ${jobPhoto.deletedAt} is null
        and ${jobPhoto.caption} ilike ${pattern})`,
      sql`exists (select 1 from ${capture} where ${capture.jobId} = ${job.id} and ${capture.deletedAt} is null
        and ${capture.title} ilike ${pattern})`,
    );
  });
}
