import { and, eq, isNull } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { job, jobEntry, membership } from '../../db/schema.ts';
import { jobVisible, memberOf, reachable } from '../conditions.ts';
import type { Door } from '../door.ts';

export type JobEntryRecord = typeof jobEntry.$inferSelect;

/** A note or reading, through its job; who wrote it is who counts for `own`. */
export const jobEntryDoor: Door<JobEntryRecord> = {
  find: (person, entryId, { deleted }) =>
    db()
      .select({ thing: jobEntry, role: membership.role, madeBy: jobEntry.createdBy })
      .from(jobEntry)
      .innerJoin(job, eq(job.id, jobEntry.jobId))
      .innerJoin(membership, memberOf(person, job.workshopId))
      .where(
        and(
          eq(jobEntry.id, entryId),
          isNull(job.deletedAt),
          reachable(jobEntry.deletedAt, deleted),
          jobVisible(),
        ),
      ),
};
