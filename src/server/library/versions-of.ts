import { sql } from 'drizzle-orm';
import { z } from 'zod';
import { KNOWN_GOOD_STATES } from '../../contract/areas/library.ts';
import type { KnownGoodRecord } from '../access.ts';
import { db } from '../db/client.ts';

const rowShape = z.object({
  id: z.string(),
  version: z.number(),
  state: z.enum(KNOWN_GOOD_STATES),
  created_at: z.coerce.date(),
});

/** Every version of a known-good, oldest first: down the line of what it replaced, then up what replaced or would replace it. */
export async function versionsOf(row: KnownGoodRecord) {
  if (row.version === 1 && row.supersededBy === null && row.state !== 'published')
    return [asVersion({ id: row.id, version: 1, state: row.state, created_at: row.createdAt })];
  const found = await db().execute(sql`
    with recursive older as (
      select id, supersedes from known_good where id = ${row.id}
      union select k.id, k.supersedes from known_good k join older o on k.id = o.supersedes
    ), line as (
      select id from older where supersedes is null
      union select k.id from known_good k join line l on k.supersedes = l.id
    )
    select k.id, k.version, k.state, k.created_at from known_good k join line l on l.id = k.id
     order by k.version, k.created_at limit 100`);
  return z.array(rowShape).parse(found.rows).map(asVersion);
}

const asVersion = (row: z.infer<typeof rowShape>) => ({
  id: row.id,
  version: row.version,
  state: row.state,
  createdAt: row.created_at.toISOString(),
});
