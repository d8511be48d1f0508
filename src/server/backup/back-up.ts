import { createWriteStream } from 'node:fs';
import { open, rename, rm } from 'node:fs/promises';
import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { ZipFile } from 'yazl';
import { config } from '../config.ts';
import { ApiError } from '../errors.ts';
import { ensureBucket } from '../storage/ensure-bucket.ts';
import { getObject } from '../storage/get-object.ts';
import { listKeys } from '../storage/list-keys.ts';
import { type Counted, counted } from './counted.ts';
import { databaseProgram, ended } from './database-program.ts';
import { DATABASE_ENTRY, MANIFEST_ENTRY, type Manifest, objectEntry } from './format.ts';

/** Bytes as they are: the dump and the samples are packed or do not pack well, and a plain file is quicker to restore. */
const PLAIN = { compress: false, mode: 0o100600 } as const;

/**
 * Writes database and objects into one new file. The database comes first, as one moment of it: an object that it names and
 * that is never changed is still there when its turn comes. Gives how many objects and bytes it holds.
 */
export async function backUp(file: string): Promise<{ objects: number; bytes: number }> {
  const half = `${file}.half`;
  await ensureBucket();
  const zip = new ZipFile();
  const written = pipeline(
    Readable.from(zip.outputStream),
    createWriteStream(half, { mode: 0o600, flags: 'wx' }),
  );
  try {
    const database = await addDatabase(zip);
    const objects = await addObjects(zip);
    addManifest(zip, () => ({
      format: 'gapmark backup 1',
      madeAt: new Date().toISOString(),
      database: database.seen(),
      objects: objects.flatMap(({ key, entry, of }) => {
        const part = of();
        return part === undefined ? [] : [{ key, entry, ...part.seen() }];
      }),
      secret: config().secret,
    }));
    zip.end();
    await written;
    const handle = await open(half, 'r+');
    await handle.sync();
    const { size } = await handle.stat();
    await handle.close();
    await rename(half, file);
    return { objects: objects.length, bytes: size };
  } catch (error) {
    zip.outputStream.emit('error', error);
    await written.catch(() => {});
    await rm(half, { force: true });
    throw error;
  }
}

/** Waits until the dump is whole in the file, so that objects are listed after it. */
async function addDatabase(zip: ZipFile): Promise<Counted> {
  const program = databaseProgram('pg_dump', ['--format=custom', '--no-owner', '--no-privileges']);
  if (program.stdout === null) throw new Error('pg_dump has no output');
  const part = counted(program.stdout);
  zip.addReadStream(part.stream, DATABASE_ENTRY, PLAIN);
  await ended(program, 'pg_dump');
  return part;
}

interface AddedObject {
  readonly key: string;
  readonly entry: string;
  readonly of: () => Counted | undefined;
}

async function addObjects(zip: ZipFile): Promise<AddedObject[]> {
  const keys = await listKeys('');
  return keys.map((key, at) => {
    let part: Counted | undefined;
    const entry = objectEntry(at);
    zip.addReadStreamLazy(entry, PLAIN, (give) => {
      getObject(key).then(
        ({ body }) => {
          part = counted(body);
          give(null, part.stream);
        },
        // What went meanwhile was not wanted any more; its place stays empty and is left out of the manifest.
        (error: unknown) =>
          error instanceof ApiError && error.code === 'not_found'
            ? give(null, Readable.from([]))
            : give(error, Readable.from([])),
      );
    });
    return { key, entry, of: () => part };
  });
}

/** Made when its turn comes: by then everything before it has been counted. */
function addManifest(zip: ZipFile, make: () => Manifest): void {
  zip.addReadStreamLazy(MANIFEST_ENTRY, { compress: true, mode: 0o100600 }, (give) =>
    give(null, Readable.from([Buffer.from(JSON.stringify(make()))])),
  );
}
