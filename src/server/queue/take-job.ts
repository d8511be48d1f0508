import { randomUUID } from 'node:crypto';
import type PgBoss from 'pg-boss';
import { queue } from './boss.ts';
import type { QueueName } from './names.ts';
import { inTransaction } from './transaction.ts';

/** A job in our hands. `take` is new each time that any worker takes it; `takes` counts them from 1. */
export interface TakenJob {
  readonly name: QueueName;
  readonly id: string;
  readonly data: object;
  readonly take: string;
  readonly takes: number;
}

/**
 * Takes the next job of a queue and writes the worker's name on it in the same transaction, so there is no moment in which
 * a job is taken by nobody. Null when there is none.
 */
export async function takeJob(name: QueueName, worker: number): Promise<TakenJob | null> {
  const boss = await queue();
  return inTransaction(async ({ queueDb }) => {
    const [job]: PgBoss.Job<object>[] = await boss.fetch<object>(name, { db: queueDb });
    if (job === undefined) return null;
    const take = randomUUID();
    const { rows } = await queueDb.executeSql(
      `update pgboss.job
          set output = jsonb_build_object('worker', $3::int, 'take', $4::text,
                'takes', coalesce((data->>'takes')::int, 0) + 1),
              data = data || jsonb_build_object('takes', coalesce((data->>'takes')::int, 0) + 1)
        where name = $1 and id = $2 returning (data->>'takes')::int as takes`,
      [name, job.id, worker, take],
    );
    return { name, id: job.id, data: job.data, take, takes: Number(rows[0]?.takes) };
  });
}
