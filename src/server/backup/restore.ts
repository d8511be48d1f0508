import { Writable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { connectionPool } from '../db/client.ts';
import { ensureBucket } from '../storage/ensure-bucket.ts';
import { putStream } from '../storage/put-stream.ts';
import { counted } from './counted.ts';
import { databaseProgram, ended } from './database-program.ts';
import { DATABASE_ENTRY, MANIFEST_ENTRY, type Manifest, manifest } from './format.ts';
import { openZip, type ZipReader } from './zip-reader.ts';

const MOST_PARTS = 50_000_000;
const LONGEST_MANIFEST = 1024 ** 3;

/** A fault that the person at the terminal can do something about. */
export class RestoreRefused extends Error {
  override readonly name = 'RestoreRefused';
}

/**
 * Fills an empty installation from a backup: all sums are checked first, then the objects go in, then the database in one
 * transaction, so that a restore that breaks off leaves an installation that is still empty.
 */
export async function restore(file: string): Promise<{ objects: number; secret: string }> {
  await refuseUnlessEmpty();
  const zip = await openZip(file, MOST_PARTS).catch((error: Error) => {
    throw new RestoreRefused(`${file} is no backup that can be read: ${error.message}.`);
  });
  try {
    const what = await readManifest(zip);
    await checkSums(zip, what);
    await ensureBucket();
    for (const { key, entry } of what.objects) await putStream(key, await zip.read(entry));
    await restoreDatabase(zip);
    return { objects: what.objects.length, secret: what.secret };
  } finally {
    zip.close();
  }
}

async function refuseUnlessEmpty(): Promise<void> {
  const pool = connectionPool();
  const { rows } = await pool.query<{ there: boolean }>(
    "select to_regclass('public.person') is not null as there",
  );
  if (!rows[0]?.there) return;
  throw new RestoreRefused(
    'This installation has a database already. A backup goes into an empty one: give a new data folder (GAPMARK_DATA) or ' +
      'an empty database and bucket. Nothing was changed.',
  );
}

async function readManifest(zip: ZipReader): Promise<Manifest> {
  const chunks: Buffer[] = [];
  let bytes = 0;
  try {
    for await (const chunk of await zip.read(MANIFEST_ENTRY)) {
      bytes += (chunk as Buffer).byteLength;
      if (bytes > LONGEST_MANIFEST) throw new Error('it is too long');
      chunks.push(chunk as Buffer);
    }
    return manifest.parse(JSON.parse(Buffer.concat(chunks).toString('utf8')));
  } catch (error) {
    throw new RestoreRefused(
      `The list of what the backup holds cannot be read (${oneLine(error)}). Nothing was changed.`,
    );
  }
}

const oneLine = (error: unknown) => (error instanceof Error ? error.message : String(error)).split('\n')[0];

async function checkSums(zip: ZipReader, what: Manifest): Promise<void> {
  const parts = [{ entry: DATABASE_ENTRY, ...what.database }, ...what.objects];
  for (const { entry, sha256 } of parts) {
    const part = counted(await zip.read(entry));
    const sink = new Writable({ write: (_chunk, _encoding, done) => done() });
    const fault = await pipeline(part.stream, sink).then(
      () => (part.seen().sha256 === sha256 ? null : 'its sum is another'),
      (error: unknown) => oneLine(error),
    );
    if (fault !== null)
      throw new RestoreRefused(
        `The backup is damaged: ${entry} (${fault}). Nothing was changed. Take another backup.`,
      );
  }
}

async function restoreDatabase(zip: ZipReader): Promise<void> {
  const program = databaseProgram('pg_restore', [
    '--no-owner',
    '--no-privileges',
    '--exit-on-error',
    '--single-transaction',
  ]);
  const done = ended(program, 'pg_restore');
  if (program.stdin === null) throw new Error('pg_restore has no input');
  await Promise.all([done, pipeline(await zip.read(DATABASE_ENTRY), program.stdin).catch(() => {})]);
}
