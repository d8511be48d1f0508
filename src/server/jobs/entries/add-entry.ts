import { and, count, eq, isNull } from 'drizzle-orm';
import type { z } from 'zod';
import type { jobEntryInput } from '../../../contract/areas/jobs.ts';
import type { JobEntryRecord, JobRecord, PersonCaller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { job, jobEntry } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { newId } from '../../ids.ts';

/** More is a mistake of a script; it also bounds the timeline. */
export const ENTRIES_LIMIT = 1_000;

/** Adds a note or a reading to a job. */
export async function addEntry(
  caller: Pick<PersonCaller, 'personId' | 'name'>,
  row: Pick<JobRecord, 'id'>,
  input: z.output<typeof jobEntryInput>,
): Promise<JobEntryRecord> {
  return db().transaction(async (tx) => {
    // The job's row is held, so that two at once cannot both take the last place, and the job is not hidden meanwhile.
    const [held] = await tx
      .select({ deletedAt: job.deletedAt })
      .from(job)
      .where(eq(job.id, row.id))
      .for('update');
    if (held === undefined || held.deletedAt !== null) throw new ApiError('not_found');
    const [present] = await tx
      .select({ total: count() })
      .from(jobEntry)
      .where(and(eq(jobEntry.jobId, row.id), isNull(jobEntry.deletedAt)));
    if ((present?.total ?? 0) >= ENTRIES_LIMIT)
      throw new ApiError('conflict', { message: `A job takes ${ENTRIES_LIMIT} notes and readings at most.` });
    const [made] = await tx
      .insert(jobEntry)
      .values({ id: newId(), jobId: row.id, createdBy: caller.personId, author: caller.name, ...input })
      .returning();
    if (made === undefined) throw new Error('the entry was not returned');
    return made;
  });
}
