import { and, eq, isNull, sql } from 'drizzle-orm';
import type { z } from 'zod';
import { jobEntryInput, type jobEntryPatch } from '../../../contract/areas/jobs.ts';
import type { JobEntryRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { jobEntry } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { checkIfMatch } from '../../http/etag.ts';
import { validate } from '../../http/validate.ts';

type Patch = z.output<typeof jobEntryPatch>;

/** Changes a note or a reading; what comes out must be a whole one. What the product noted by itself stays. */
export async function patchEntry(
  row: JobEntryRecord,
  patch: Patch,
  ifMatch: string | undefined,
): Promise<JobEntryRecord> {
  if (row.kind === 'event')
    throw new ApiError('conflict', { message: 'This line says what happened; it is not edited.' });
  return db().transaction(async (tx) => {
    const [now] = await tx
      .select()
      .from(jobEntry)
      .where(and(eq(jobEntry.id, row.id), isNull(jobEntry.deletedAt)))
      .for('update');
    if (now === undefined) throw new ApiError('not_found');
    checkIfMatch(ifMatch, now.edition);
    const { kind, text, what, value, unit } = now;
    const was = kind === 'reading' ? { kind, text, what, value, unit } : { kind, text };
    const whole = validate(jobEntryInput, { ...was, ...patch });
    const [changed] = await tx
      .update(jobEntry)
      .set({ ...whole, edition: sql`${jobEntry.edition} + 1`, updatedAt: sql`now()` })
      .where(eq(jobEntry.id, row.id))
      .returning();
    if (changed === undefined) throw new ApiError('not_found');
    return changed;
  });
}
