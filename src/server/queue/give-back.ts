import { connectionPool } from '../db/client.ts';
import type { TakenJob } from './take-job.ts';

/**
 * Puts a job that we hold back into the queue without counting an attempt: the process stops, or a service is away.
 * `afterS`: not to be taken before so many seconds.
 */
export async function giveBack(job: TakenJob, afterS: number): Promise<void> {
  await connectionPool().query(
    `update pgboss.job
        set state = 'retry', started_on = null, start_after = now() + make_interval(secs => $4)
      where name = $1 and id = $2 and state = 'active' and output->>'take' = $3`,
    [job.name, job.id, job.take, afterS],
  );
}
