import type PgBoss from 'pg-boss';
import type { TakenJob } from './take-job.ts';

/** The job was given up and taken by somebody else: what this attempt has to say no longer counts. */
export class StaleAttempt extends Error {
  override readonly name = 'StaleAttempt';
}

/**
 * Locks the job's row for the rest of the transaction and throws StaleAttempt unless it is still ours. Called first in
 * every transaction that writes results.
 */
export async function ownJob(queueDb: PgBoss.Db, job: TakenJob): Promise<void> {
  const { rows } = await queueDb.executeSql(
    `select 1 from pgboss.job
      where name = $1 and id = $2 and state = 'active' and output->>'take' = $3 for update`,
    [job.name, job.id, job.take],
  );
  if (rows.length === 0) throw new StaleAttempt(`Job ${job.id} is no longer held by this attempt`);
}

/** Marks the job done, in the transaction that wrote its results. */
export async function completeJob(queueDb: PgBoss.Db, job: TakenJob): Promise<void> {
  await queueDb.executeSql(
    `update pgboss.job set state = 'completed', completed_on = now()
      where name = $1 and id = $2 and state = 'active' and output->>'take' = $3`,
    [job.name, job.id, job.take],
  );
}
