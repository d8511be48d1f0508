import { and, eq, isNull, sql } from 'drizzle-orm';
import type { JobRecord, PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { job } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { auditedBy, recordAudit } from '../workshop/audit.ts';
import { nameOf } from './create-job.ts';

/** Hides a job; it can be brought back for 30 days. Its captures stay where they are. Stale editions are 412. */
export async function deleteJob(caller: PersonCaller, row: JobRecord, address: string): Promise<void> {
  await db().transaction(async (tx) => {
    const [hidden] = await tx
      .update(job)
      .set({ deletedAt: sql`now()`, edition: sql`${job.edition} + 1` })
      .where(and(eq(job.id, row.id), eq(job.edition, row.edition), isNull(job.deletedAt)))
      .returning({ id: job.id });
    if (hidden === undefined) throw new ApiError('stale');
    await recordAudit(
      { ...auditedBy(caller, row.workshopId, address), action: 'job deleted', subject: nameOf(row) },
      tx,
    );
  });
}
