import { afterAll, expect, it } from 'vitest';
import { closeDatabase } from '../../src/server/db/client.ts';
import { queueMail } from '../../src/server/mail/queue-mail.ts';
import { stopQueue } from '../../src/server/queue/boss.ts';
import { inTransaction } from '../../src/server/queue/transaction.ts';
import { newId, pool } from './security-kit.ts';

afterAll(async () => {
  await stopQueue();
  await closeDatabase();
  await pool.end();
});

it('queueMail() in a transaction that fails leaves neither mail nor work', async () => {
  const kind = `test ${newId()}`;
  const failing = inTransaction(async (transaction) => {
    await queueMail(transaction, { kind, to: 'ada@people.example', subject: 's', parts: ['p'] });
    const { rows } = await transaction.queueDb.executeSql('select id from outgoing_mail where kind = $1', [
      kind,
    ]);
    expect(rows).toHaveLength(1);
    throw new Error(rows[0].id);
  });
  const id = await failing.catch((error: Error) => error.message);
  expect((await pool.query('select 1 from outgoing_mail where kind = $1', [kind])).rowCount).toBe(0);
  expect((await pool.query("select 1 from pgboss.job where data->>'mailId' = $1", [id])).rowCount).toBe(0);
});
