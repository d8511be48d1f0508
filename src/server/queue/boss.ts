import PgBoss from 'pg-boss';
import { connectionPool } from '../db/client.ts';
import { log } from '../log.ts';
import { QUEUES } from './names.ts';

/** Work that runs longer than this is thought dead whatever its worker says; dead workers are noticed in seconds. */
const EXPIRE_HOURS = 12;
const RETRIES = 5;

let starting: Promise<PgBoss> | undefined;

/**
 * The queue in the database's schema `pgboss`, made at first use. When the database is away the next call tries again.
 * `supervise`: the worker's processes also do the queue's own housekeeping.
 */
export function queue(supervise = false): Promise<PgBoss> {
  starting ??= start(supervise).catch((error: unknown) => {
    starting = undefined;
    throw error;
  });
  return starting;
}

async function start(supervise: boolean): Promise<PgBoss> {
  const boss = new PgBoss({
    schema: 'pgboss',
    db: { executeSql: (text, values) => connectionPool().query(text, values) },
    supervise,
    schedule: false,
  });
  boss.on('error', (error) => log.warn({ err: error }, 'queue housekeeping failed'));
  await boss.start();
  const options = { retryLimit: RETRIES, retryDelay: 1, retryBackoff: true, expireInHours: EXPIRE_HOURS };
  await boss.createQueue(QUEUES.read, { name: QUEUES.read, ...options });
  await boss.createQueue(QUEUES.compare, { name: QUEUES.compare, ...options });
  await boss.createQueue(QUEUES.remeasure, { name: QUEUES.remeasure, policy: 'short', ...options });
  await boss.createQueue(QUEUES.dropSamples, { name: QUEUES.dropSamples, policy: 'short', ...options });
  await boss.createQueue(QUEUES.sweep, { name: QUEUES.sweep, policy: 'short', ...options });
  await boss.createQueue(QUEUES.mail, { name: QUEUES.mail, ...options });
  await boss.createQueue(QUEUES.webhook, { name: QUEUES.webhook, ...options });
  return boss;
}

export async function stopQueue(): Promise<void> {
  const boss = await starting?.catch(() => undefined);
  starting = undefined;
  await boss?.stop({ graceful: false, close: false, wait: true });
}
