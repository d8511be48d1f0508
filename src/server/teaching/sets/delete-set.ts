import type { SetRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { changeSet } from './change-set.ts';

/** Takes a set away; it can be brought back for 30 days. Its exercises and what was answered stay. */
export async function deleteSet(row: SetRecord): Promise<void> {
  await changeSet(db(), row, { deletedAt: new Date() });
}
