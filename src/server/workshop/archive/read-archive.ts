import { createHash } from 'node:crypto';
import { Writable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import type { Entry } from 'yauzl';
import { z } from 'zod';
import { counted } from '../../backup/counted.ts';
import { openZip, type ZipReader } from '../../backup/zip-reader.ts';
import { ApiError } from '../../errors.ts';
import { type ArchiveManifest, archiveManifest, MANIFEST_ENTRY, type Row, row, rowsEntry } from './format.ts';
import { EXPORTED } from './tables.ts';

export interface ArchiveLimits {
  readonly parts: number;
  /** Unpacked, all together. */
  readonly bytes: number;
  /** Unpacked, of rows and of the manifest, a part each. */
  readonly rowsBytes: number;
  /** How many times larger a part may be than it is packed; small ones are let be. */
  readonly ratio: number;
}

export const ARCHIVE_LIMITS: ArchiveLimits = {
  parts: 200_000,
  bytes: 20 * 1024 ** 3,
  rowsBytes: 64 * 1024 ** 2,
  ratio: 200,
};
const SMALL_BYTES = 1024 ** 2;

export interface Archive {
  readonly manifest: ArchiveManifest;
  readonly tables: ReadonlyMap<string, readonly Row[]>;
  readonly zip: ZipReader;
}

const refused = (message: string) =>
  new ApiError('bad_request', {
    message: `This is no archive that can be read: ${message} Nothing was made.`,
  });

const oneLine = (error: unknown) => (error instanceof Error ? error.message : String(error)).split('\n')[0];

/** Opens an archive and checks all of it, sums included, before anything is made of it. Close its zip afterwards. */
export async function openArchive(path: string, limits: ArchiveLimits = ARCHIVE_LIMITS): Promise<Archive> {
  const zip = await openZip(path, limits.parts).catch((error: unknown) => {
    throw refused(`${oneLine(error)}.`);
  });
  try {
    checkSizes([...zip.entries.values()], limits);
    const manifest = archiveManifest.parse(
      JSON.parse((await readWhole(zip, MANIFEST_ENTRY, limits)).toString('utf8')),
    );
    checkLayout(zip, manifest);
    const tables = new Map<string, readonly Row[]>();
    for (const { table, sha256 } of manifest.tables) {
      const bytes = await readWhole(zip, rowsEntry(table), limits);
      if (createHash('sha256').update(bytes).digest('hex') !== sha256) throw refused(`${table} was changed.`);
      tables.set(table, z.array(row).parse(JSON.parse(bytes.toString('utf8'))));
    }
    for (const { entry, sha256, bytes } of manifest.objects) {
      const part = counted(await zip.read(entry));
      await pipeline(part.stream, new Writable({ write: (_chunk, _encoding, done) => done() }));
      if (part.seen().sha256 !== sha256 || part.seen().bytes !== bytes)
        throw refused(`${entry} was changed.`);
    }
    return { manifest, tables, zip };
  } catch (error) {
    zip.close();
    throw error instanceof ApiError ? error : refused(`${oneLine(error)}.`);
  }
}

/** By what the directory says; while a part is read the package holds it to that. */
function checkSizes(entries: readonly Entry[], limits: ArchiveLimits): void {
  let total = 0;
  for (const { uncompressedSize, compressedSize, fileName } of entries) {
    total += uncompressedSize;
    if (uncompressedSize > SMALL_BYTES && uncompressedSize > compressedSize * limits.ratio)
      throw refused(`${fileName.slice(0, 60)} unpacks to more than ${limits.ratio} times its size.`);
  }
  if (total > limits.bytes) throw refused('unpacked it is larger than what is taken.');
}

/** Only what the format knows is in it, each where the manifest says. Names are compared, never used as paths. */
function checkLayout(zip: ZipReader, manifest: ArchiveManifest): void {
  const unknown = manifest.tables.find(({ table }) => !Object.hasOwn(EXPORTED, table));
  if (unknown !== undefined) throw refused('it holds a kind of thing that this version does not know.');
  const named = [
    ...manifest.tables.map(({ table }) => rowsEntry(table)),
    ...manifest.objects.map(({ entry }) => entry),
  ];
  if (new Set(named).size !== named.length) throw refused('a part is named twice.');
  for (const name of named) if (!zip.entries.has(name)) throw refused(`${name} is missing.`);
  const known = new Set([...named, MANIFEST_ENTRY]);
  for (const [name, { uncompressedSize }] of zip.entries)
    if (!known.has(name) && !(/^objects\/\d{8}$/.test(name) && uncompressedSize === 0))
      throw refused(`it has a part that does not belong there (${name.slice(0, 60)}).`);
}

async function readWhole(zip: ZipReader, name: string, limits: ArchiveLimits): Promise<Buffer> {
  const entry = zip.entries.get(name);
  if (entry === undefined) throw refused(`${name} is missing.`);
  if (entry.uncompressedSize > limits.rowsBytes) throw refused(`${name} is too long.`);
  const chunks: Buffer[] = [];
  for await (const chunk of await zip.read(name)) chunks.push(chunk as Buffer);
  return Buffer.concat(chunks);
}
