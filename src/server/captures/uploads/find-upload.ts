import { and, eq } from 'drizzle-orm';
import type { PersonCaller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { upload } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';

export type UploadRecord = typeof upload.$inferSelect;

/** An upload belongs to its maker; for everybody else it is not there. A token sees those of its workshop only. */
export async function findUpload(caller: PersonCaller, id: string): Promise<UploadRecord> {
  const [row] = await db()
    .select()
    .from(upload)
    .where(
      and(
        eq(upload.id, id),
        eq(upload.personId, caller.personId),
        caller.via === 'token' ? eq(upload.workshopId, caller.workshopId) : undefined,
      ),
    );
  if (row === undefined || (row.finishedAt !== null && row.captureId === null))
    throw new ApiError('not_found');
  return row;
}
