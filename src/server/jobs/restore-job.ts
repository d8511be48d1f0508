import { eq, sql } from 'drizzle-orm';
import type { JobRecord, PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { job } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { auditedBy, recordAudit } from '../workshop/audit.ts';
import { nameOf } from './create-job.ts';

/** Brings a hidden job back; one that is not hidden stays as it is. */
export async function restoreJob(caller: PersonCaller, row: JobRecord, address: string): Promise<JobRecord> {
  if (row.deletedAt === null) return row;
  return db().transaction(async (tx) => {
    const [back] = await tx
      .update(job)
      .set({ deletedAt: null, edition: sql`${job.edition} + 1` })
      .where(eq(job.id, row.id))
      .returning();
    if (back === undefined) throw new ApiError('not_found');
    await recordAudit(
      { ...auditedBy(caller, row.workshopId, address), action: 'job brought back', subject: nameOf(row) },
      tx,
    );
    return back;
  });
}
