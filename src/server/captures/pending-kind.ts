import type PgBoss from 'pg-boss';
import { QUEUES, type ReadJob, readJob } from '../queue/names.ts';

/** What the queued work of a capture's present revision is, or null when there is none. */
export async function pendingKind(
  queueDb: PgBoss.Db,
  capture: { readonly id: string; readonly revision: number },
): Promise<ReadJob['kind'] | null> {
  const { rows } = await queueDb.executeSql(
    `select data from pgboss.job
      where name = $1 and state in ('created', 'retry', 'active')
        and data->>'captureId' = $2 and (data->>'revision')::int = $3 limit 1`,
    [QUEUES.read, capture.id, capture.revision],
  );
  return rows.length === 0 ? null : readJob.parse(rows[0].data).kind;
}
