import { and, eq } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { job, membership } from '../../db/schema.ts';
import { jobVisible, memberOf, reachable } from '../conditions.ts';
import type { Door } from '../door.ts';

export type JobRecord = typeof job.$inferSelect;

/** A job of a workshop that the person belongs to. */
export const jobDoor: Door<JobRecord> = {
  find: (person, jobId, { deleted }) =>
    db()
      .select({ thing: job, role: membership.role, madeBy: job.createdBy })
      .from(job)
      .innerJoin(membership, memberOf(person, job.workshopId))
      .where(and(eq(job.id, jobId), reachable(job.deletedAt, deleted), jobVisible())),
};
