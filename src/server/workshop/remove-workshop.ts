import { connectionPool } from '../db/client.ts';
import { log } from '../log.ts';
import { deleteObjects } from '../storage/delete-objects.ts';
import { capturePrefix, knownGoodPrefix, photoKey, smallPhotoKey } from '../storage/keys.ts';
import { listKeys } from '../storage/list-keys.ts';
import { ownedTables } from './owned-tables.ts';

/**
 * Removes a workshop for good: its objects first, so that a broken-off removal is taken up again, then every row. Its people
 * keep their accounts.
 */
export async function removeWorkshop(workshopId: string): Promise<void> {
  const pool = connectionPool();
  const idsOf = async (table: 'capture' | 'known_good') =>
    (await pool.query<{ id: string }>(`select id from ${table} where workshop_id = $1`, [workshopId])).rows;
  for (const { id } of await idsOf('capture')) await deleteObjects(await listKeys(capturePrefix(id)));
  for (const { id } of await idsOf('known_good')) await deleteObjects(await listKeys(knownGoodPrefix(id)));
  const { rows: photos } = await pool.query<{ id: string }>(
    'select p.id from job_photo p join job j on j.id = p.job_id where j.workshop_id = $1',
    [workshopId],
  );
  await deleteObjects(photos.flatMap(({ id }) => [photoKey(id), smallPhotoKey(id)]));
  const client = await pool.connect();
  try {
    await client.query('begin');
    await client.query('select 1 from workshop where id = $1 for update', [workshopId]);
    for (const { name, where } of await ownedTables(client))
      await client.query(`delete from "${name}" where ${where}`, [workshopId]);
    await client.query('update person set current_workshop_id = null where current_workshop_id = $1', [
      workshopId,
    ]);
    await client.query('delete from workshop where id = $1', [workshopId]);
    await client.query('commit');
  } catch (error) {
    await client.query('rollback').catch(() => {});
    throw error;
  } finally {
    client.release();
  }
  log.info({ workshop: workshopId }, 'a workshop was removed');
}
