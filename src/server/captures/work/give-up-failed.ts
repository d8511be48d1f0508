import { connectionPool } from '../../db/client.ts';
import { QUEUES } from '../../queue/names.ts';

/**
 * Captures whose work failed so often that the queue gave it up: say so, instead of showing "reading" for ever. The
 * original stays and reading can be asked for again.
 */
export async function giveUpFailed(): Promise<void> {
  const error = {
    code: 'internal',
    message: 'Reading this file was broken off several times by a fault on our side. The file is kept.',
    hint: 'Try again from the reading page. If it happens again, tell the people who run this server.',
  };
  await connectionPool().query(
    `update capture c set status = 'failed', progress = 0, error = $2::jsonb, updated_at = now()
       from pgboss.job j
      where j.name = $1 and j.state = 'failed' and j.data->>'captureId' = c.id
        and (j.data->>'revision')::int = c.revision and c.status in ('queued', 'reading', 'measuring')
        and not exists (select 1 from pgboss.job k where k.name = $1 and k.state < 'completed'
              and k.data->>'captureId' = c.id)`,
    [QUEUES.read, JSON.stringify(error)],
  );
}
