import { drizzle, type NodePgDatabase } from 'drizzle-orm/node-postgres';
import pg from 'pg';
import { config } from '../config.ts';
import * as schema from './schema.ts';

export type Database = NodePgDatabase<typeof schema>;
/** What use cases take: the database or a transaction on it. */
export type Executor = Database | Parameters<Parameters<Database['transaction']>[0]>[0];

let pool: pg.Pool | undefined;
let database: Database | undefined;

/** The process's pool of connections. An idle connection that breaks is dropped, not fatal. */
export function connectionPool(): pg.Pool {
  if (pool === undefined) {
    pool = new pg.Pool({
      connectionString: config().databaseUrl,
      max: 12,
      connectionTimeoutMillis: 5_000,
      statement_timeout: 60_000,
      idle_in_transaction_session_timeout: 60_000,
    });
    pool.on('error', () => {});
  }
  return pool;
}

export function db(): Database {
  database ??= drizzle(connectionPool(), { schema });
  return database;
}

export async function closeDatabase(): Promise<void> {
  await pool?.end();
  pool = undefined;
  database = undefined;
}
