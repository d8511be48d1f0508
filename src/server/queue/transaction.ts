import { drizzle } from 'drizzle-orm/node-postgres';
import type PgBoss from 'pg-boss';
import { connectionPool, type Database } from '../db/client.ts';
import * as schema from '../db/schema.ts';
import { queue } from './boss.ts';
import type { QueueName } from './names.ts';

/** Puts work into the queue as part of the transaction: rolled back with it, seen by workers when it commits. */
export type Send = (name: QueueName, data: object, options?: PgBoss.SendOptions) => Promise<void>;

/** The channel on which workers hear that there is work. */
export const WORK_CHANNEL = 'gapmark_work';

export interface Transaction {
  readonly tx: Database;
  readonly send: Send;
  /** The queue's executor on this transaction, for calls other than send. */
  readonly queueDb: PgBoss.Db;
}

/** Runs rows and queued work in one transaction on one connection. */
export async function inTransaction<T>(run: (transaction: Transaction) => Promise<T>): Promise<T> {
  const boss = await queue();
  const client = await connectionPool().connect();
  const queueDb: PgBoss.Db = { executeSql: (text, values) => client.query(text, values) };
  const send: Send = async (name, data, options = {}) => {
    await boss.send(name, data, { ...options, db: queueDb });
    await client.query('select pg_notify($1, $2)', [WORK_CHANNEL, name]);
  };
  let broken: Error | undefined;
  try {
    await client.query('begin');
    const result = await run({ tx: drizzle(client, { schema }), send, queueDb });
    await client.query('commit');
    return result;
  } catch (error) {
    // A connection that cannot even roll back is thrown away, not given to the next one.
    await client.query('rollback').catch((fault: Error) => {
      broken = fault;
    });
    throw error;
  } finally {
    client.release(broken);
  }
}
