import { createHash } from 'node:crypto';
import { Readable } from 'node:stream';
import type pg from 'pg';
import { ZipFile } from 'yazl';
import { type Counted, counted } from '../../backup/counted.ts';
import { connectionPool } from '../../db/client.ts';
import { ApiError } from '../../errors.ts';
import { getObject } from '../../storage/get-object.ts';
import { knownGoodPrefix } from '../../storage/keys.ts';
import { listKeys } from '../../storage/list-keys.ts';
import { ownedTables } from '../owned-tables.ts';
import { type ArchiveManifest, MANIFEST_ENTRY, objectEntry, type Row, rowsEntry } from './format.ts';
import { EXPORTED } from './tables.ts';

interface Source {
  readonly key: string;
  readonly owner: string;
  readonly kind: 'original' | 'known-good';
  readonly name: string;
}

interface Collected {
  readonly workshop: ArchiveManifest['workshop'];
  readonly people: ArchiveManifest['people'];
  readonly tables: readonly { readonly table: string; readonly rows: readonly Row[] }[];
  readonly originals: readonly Source[];
}

/**
 * A workshop as a stream of a zip: the rows of one moment, then originals and frozen samples one after another, then the
 * manifest with the sums of what went before.
 */
export async function writeArchive(workshopId: string): Promise<Readable> {
  const { workshop, people, tables, originals } = await collect(workshopId);
  const zip = new ZipFile();
  const sums = tables.map(({ table, rows }) => {
    const bytes = Buffer.from(JSON.stringify(rows));
    zip.addBuffer(bytes, rowsEntry(table));
    return { table, sha256: createHash('sha256').update(bytes).digest('hex') };
  });
  const goods = tables.find(({ table }) => table === 'known_good')?.rows ?? [];
  const sources = [...originals, ...(await frozen(goods.map((row) => String(row.id))))];
  const parts = sources.map((source, at) => ({
    source,
    entry: objectEntry(at),
    of: addObject(zip, source, at),
  }));
  zip.addReadStreamLazy(MANIFEST_ENTRY, (give) => {
    const made: ArchiveManifest = {
      format: 'gapmark workshop 1',
      madeAt: new Date().toISOString(),
      workshop,
      people: [...people],
      tables: sums,
      objects: parts.flatMap(({ source: { owner, kind, name }, entry, of }) => {
        const part = of();
        return part === undefined ? [] : [{ entry, owner, kind, name, ...part.seen() }];
      }),
    };
    give(null, Readable.from([Buffer.from(JSON.stringify(made))]));
  });
  zip.end();
  return Readable.from(zip.outputStream);
}

/** Streams the object when its turn comes. One that went meanwhile leaves an empty place that the manifest does not name. */
function addObject(zip: ZipFile, { key }: Source, at: number): () => Counted | undefined {
  let part: Counted | undefined;
  zip.addReadStreamLazy(objectEntry(at), { compress: true }, (give) => {
    getObject(key).then(
      ({ body }) => {
        part = counted(body);
        give(null, part.stream);
      },
      (error: unknown) =>
        error instanceof ApiError && error.code === 'not_found'
          ? give(null, Readable.from([]))
          : give(error, Readable.from([])),
    );
  });
  return () => part;
}

async function frozen(knownGoodIds: readonly string[]): Promise<Source[]> {
  const found: Source[] = [];
  for (const owner of knownGoodIds) {
    const prefix = knownGoodPrefix(owner);
    for (const key of await listKeys(prefix))
      found.push({ key, owner, kind: 'known-good', name: key.slice(prefix.length) });
  }
  return found;
}

/** All rows of one moment, those that were deleted and can be brought back among them. */
async function collect(workshopId: string): Promise<Collected> {
  const client = await connectionPool().connect();
  try {
    await client.query('begin isolation level repeatable read read only');
    const { rows: shops } = await client.query<{ id: string; name: string; timeZone: string }>(
      'select id, name, time_zone as "timeZone" from workshop where id = $1',
      [workshopId],
    );
    const workshop = shops[0];
    if (workshop === undefined) throw new ApiError('not_found');
    const owned = (await ownedTables(client)).filter(({ name }) => Object.hasOwn(EXPORTED, name)).reverse();
    const tables: { table: string; rows: Row[] }[] = [];
    for (const { name, where } of owned)
      tables.push({ table: name, rows: await rowsOf(client, name, where, workshopId) });
    const { rows: keys } = await client.query<{ id: string; key: string }>(
      'select id, original_key as key from capture where workshop_id = $1 order by id',
      [workshopId],
    );
    const people = await namesOf(
      client,
      tables.flatMap(({ rows }) => rows),
    );
    await client.query('commit');
    const originals = keys.map(({ id, key }) => ({
      key,
      owner: id,
      kind: 'original' as const,
      name: 'original',
    }));
    return { workshop, people, tables, originals };
  } finally {
    await client.query('rollback').catch(() => {});
    client.release();
  }
}

async function rowsOf(
  client: pg.PoolClient,
  table: string,
  where: string,
  workshopId: string,
): Promise<Row[]> {
  const without = EXPORTED[table]?.without ?? [];
  const { rows } = await client.query<{ row: Row }>(
    `select to_jsonb(t) - $2::text[] as row from "${table}" t where ${where} order by to_jsonb(t)->>'id'`,
    [workshopId, without],
  );
  return rows.map(({ row }) => row);
}

/** Everybody whom a row names, by the name that they have now. */
async function namesOf(client: pg.PoolClient, rows: readonly Row[]): Promise<{ id: string; name: string }[]> {
  const texts = new Set(
    rows.flatMap((row) => Object.values(row).filter((value) => typeof value === 'string')),
  );
  const { rows: people } = await client.query<{ id: string; name: string }>(
    'select id, name from person where id = any($1) order by id',
    [[...texts]],
  );
  return people;
}
