import { type ChildProcess, spawn } from 'node:child_process';
import { join } from 'node:path';
import { config } from '../config.ts';

/**
 * Starts one of PostgreSQL's own programs on our database. `PG_BIN` names their folder; without it they are looked for as any
 * program is. The password goes by the environment: arguments are seen by everybody on the machine.
 */
export function databaseProgram(name: 'pg_dump' | 'pg_restore', args: readonly string[]): ChildProcess {
  const url = new URL(config().databaseUrl);
  const PGPASSWORD = decodeURIComponent(url.password);
  url.password = '';
  const folder = process.env.PG_BIN;
  return spawn(folder ? join(folder, name) : name, [...args, '--dbname', url.href], {
    env: { PATH: process.env.PATH, LANG: 'C.UTF-8', PGPASSWORD },
    stdio: ['pipe', 'pipe', 'pipe'],
  });
}

/** Waits for its end. @throws with its last words when it failed. */
export function ended(program: ChildProcess, name: string): Promise<void> {
  let words = '';
  program.stderr?.on('data', (data: Buffer) => {
    words = (words + data.toString('utf8')).slice(-4_000);
  });
  return new Promise((resolve, reject) => {
    program.once('error', reject);
    program.once('close', (code) =>
      code === 0 ? resolve() : reject(new Error(`${name} failed:\n${words.trim()}`)),
    );
  });
}
