import { drizzle } from 'drizzle-orm/node-postgres';
import { migrate } from 'drizzle-orm/node-postgres/migrator';
import pg from 'pg';
import { readConfig } from '../config.ts';

/**
 * Brings the database up to this version's tables. Two that start at once wait for each other on an advisory lock.
 * Run from the project's root: `node dist/tools/migrate.js`.
 */
const client = new pg.Client({ connectionString: readConfig(process.env).databaseUrl });
await client.connect();
try {
  await client.query("select pg_advisory_lock(hashtext('gapmark migrate'))");
  await migrate(drizzle(client), { migrationsFolder: 'drizzle' });
} finally {
  await client.end();
}
