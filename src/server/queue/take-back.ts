import { queue } from './boss.ts';
import { LOCK_CLASS } from './lock-session.ts';
import { inTransaction } from './transaction.ts';

/**
 * Puts back the work of workers whose lock is free, that is, whose process is gone. It counts as an attempt, so that a file
 * which kills its worker is given up in the end. Gives how many jobs came back.
 */
export async function takeBackFromDead(): Promise<number> {
  const boss = await queue();
  return inTransaction(async ({ queueDb }) => {
    const { rows } = await queueDb.executeSql(
      `select j.name, j.id from pgboss.job j
        where j.state = 'active' and j.output->>'worker' is not null
          and not exists (
            select 1 from pg_locks l
             where l.locktype = 'advisory' and l.granted and l.objsubid = 2
               and l.database = (select oid from pg_database where datname = current_database())
               and l.classid = $1::oid and l.objid = (j.output->>'worker')::int::oid)
        for update of j skip locked`,
      [LOCK_CLASS.worker],
    );
    for (const { name, id } of rows) await boss.fail(name, id, {}, { db: queueDb });
    if (rows.length > 0) await queueDb.executeSql("select pg_notify('gapmark_work', '')", []);
    return rows.length;
  });
}
