import type PgBoss from 'pg-boss';
import type { PersonCaller } from '../../access.ts';
import { config } from '../../config.ts';
import { membership, person, workshop } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { hashSecret, newId, newSecret } from '../../ids.ts';
import { QUEUES, type ReadJob } from '../../queue/names.ts';
import { inTransaction, type Transaction } from '../../queue/transaction.ts';
import { deleteObjects } from '../../storage/delete-objects.ts';
import { knownGoodPrefix, originalKey } from '../../storage/keys.ts';
import { putStream } from '../../storage/put-stream.ts';
import { auditedBy, recordAudit } from '../audit.ts';
import { ownedTables } from '../owned-tables.ts';
import type { ArchiveManifest, Row } from './format.ts';
import { type Archive, openArchive } from './read-archive.ts';
import { renamedIds } from './renamed-ids.ts';
import { EXPORTED } from './tables.ts';

/**
 * Makes a new workshop from an archive, with the caller as owner and new ids, in one transaction; every original is read and
 * measured again. When anything is wrong nothing is made.
 */
export async function importWorkshop(
  caller: PersonCaller,
  path: string,
  address: string,
): Promise<{ id: string; name: string; captures: number }> {
  if (config().signUp !== 'open' && caller.role !== 'owner') throw new ApiError('sign_up_closed');
  const archive = await openArchive(path);
  const written: string[] = [];
  try {
    const { manifest, tables, zip } = archive;
    checkLimit(manifest);
    const ids = renamedIds([
      manifest.workshop.id,
      ...manifest.people.map((one) => one.id),
      ...rowIds(tables),
    ]);
    for (const { entry, owner, kind, name } of manifest.objects) {
      const id = ids.idOf(owner);
      if (id === undefined)
        throw new ApiError('bad_request', { message: 'The archive has an object of nothing.' });
      const key = kind === 'original' ? originalKey(id) : `${knownGoodPrefix(id)}${name}`;
      written.push(key);
      await putStream(key, await zip.read(entry));
    }
    return await inTransaction((transaction) => make(transaction, { caller, archive, ids, address }));
  } catch (error) {
    await deleteObjects(written).catch(() => {});
    throw refusalOf(error);
  } finally {
    archive.zip.close();
  }
}

/** PostgreSQL's classes 22 and 23 (data, constraints): the rows are not what they should be. */
function refusalOf(error: unknown): unknown {
  for (let cause = error, depth = 0; cause instanceof Error && depth < 4; cause = cause.cause, depth += 1) {
    const code = 'code' in cause && typeof cause.code === 'string' ? cause.code : '';
    if (/^2[23]\w{3}$/.test(code))
      return new ApiError('bad_request', {
        message: 'This is no archive that can be read: its rows do not fit together. Nothing was made.',
        cause: error,
      });
  }
  return error;
}

function checkLimit(manifest: ArchiveManifest): void {
  const limit = config().workshopLimitBytes;
  const bytes = manifest.objects.reduce((sum, one) => sum + one.bytes, 0);
  if (limit !== null && bytes > limit)
    throw new ApiError('too_large', {
      message: 'The archive holds more than a workshop may keep here. Nothing was made.',
    });
}

const rowIds = (tables: Archive['tables']): string[] =>
  [...tables.values()].flatMap((rows) => rows.flatMap((row) => (typeof row.id === 'string' ? [row.id] : [])));

interface Making {
  readonly caller: PersonCaller;
  readonly archive: Archive;
  readonly ids: ReturnType<typeof renamedIds>;
  readonly address: string;
}

async function make({ tx, send, queueDb }: Transaction, { caller, archive, ids, address }: Making) {
  const { manifest, tables } = archive;
  const { name, timeZone } = manifest.workshop;
  const id = ids.idOf(manifest.workshop.id) ?? newId();
  await tx.insert(workshop).values({ id, name, timeZone });
  await tx.insert(membership).values({ personId: caller.personId, workshopId: id, role: 'owner' });
  for (const one of manifest.people) {
    // A name to stand beside what they made; nobody signs in as them.
    const made = { id: ids.idOf(one.id) ?? newId(), name: one.name, passwordHash: 'none' };
    await tx.insert(person).values({ ...made, email: `${made.id}@imported.invalid` });
  }
  const order = (await ownedTables({ query: (text) => queueDb.executeSql(text, []) }))
    .map((table) => table.name)
    .reverse();
  for (const table of order.filter((one) => tables.has(one)))
    await insertRows(
      queueDb,
      table,
      (tables.get(table) ?? []).map((row) => completed(table, ids.rename(row), id)),
    );
  const captures = (tables.get('capture') ?? []).flatMap((row) => ids.idOf(String(row.id)) ?? []);
  for (const captureId of captures)
    await send(QUEUES.read, { captureId, revision: 1, kind: 'read' } satisfies ReadJob);
  await recordAudit({ ...auditedBy(caller, id, address), action: 'workshop read back', subject: name }, tx);
  return { id, name, captures: captures.length };
}

/** What the archive leaves out and the table wants. A row always belongs to the new workshop, whatever it says. */
function completed(table: string, row: Row, workshopId: string): Row {
  const own = Object.hasOwn(row, 'workshop_id') ? { ...row, workshop_id: workshopId } : row;
  if (table === 'capture') return { ...own, original_key: originalKey(String(row.id)) };
  if (table === 'share_link')
    return { ...own, secret_hash: hashSecret(newSecret()), withdrawn_at: new Date().toISOString() };
  return own;
}

const quoted = (name: string) => `"${name.replaceAll('"', '""')}"`;

/** Inserts rows by the table's own columns, those that it computes left out; what a row has besides is left, what it lacks takes its default. */
async function insertRows(queueDb: PgBoss.Db, table: string, rows: readonly Row[]): Promise<void> {
  if (!Object.hasOwn(EXPORTED, table)) throw new Error(`${table} is not for archives`);
  const { rows: known } = await queueDb.executeSql(
    "select column_name as name from information_schema.columns where table_schema = 'public' and table_name = $1 and is_generated = 'NEVER'",
    [table],
  );
  const columns = new Set(known.map((column: { name: string }) => column.name));
  for (const row of rows) {
    const names = Object.keys(row).filter((column) => columns.has(column));
    const list = names.map(quoted).join(', ');
    await queueDb.executeSql(
      `insert into ${quoted(table)} (${list}) select ${list} from jsonb_populate_record(null::${quoted(table)}, $1::jsonb)`,
      [JSON.stringify(row)],
    );
  }
}
