import { connectionPool } from '../db/client.ts';
import { QUEUES } from '../queue/names.ts';

/** Comparisons whose work failed so often that the queue gave it up: say so, instead of showing "running" for ever. */
export async function giveUpComparisons(): Promise<void> {
  await connectionPool().query(
    `update comparison c set status = 'failed', error = $2
       from pgboss.job j
      where j.name = $1 and j.state = 'failed' and j.data->>'comparisonId' = c.id and c.status in ('queued', 'running')`,
    [
      QUEUES.compare,
      'Comparing was broken off several times by a fault on our side. The captures are unchanged; you can compare them anew.',
    ],
  );
}
