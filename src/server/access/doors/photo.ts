import { and, eq, isNull } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { job, jobPhoto, membership } from '../../db/schema.ts';
import { jobVisible, memberOf, reachable } from '../conditions.ts';
import type { Door } from '../door.ts';

export type PhotoRecord = typeof jobPhoto.$inferSelect;

/** A photo, through its job; who took it is who counts for `own`. */
export const photoDoor: Door<PhotoRecord> = {
  find: (person, photoId, { deleted }) =>
    db()
      .select({ thing: jobPhoto, role: membership.role, madeBy: jobPhoto.createdBy })
      .from(jobPhoto)
      .innerJoin(job, eq(job.id, jobPhoto.jobId))
      .innerJoin(membership, memberOf(person, job.workshopId))
      .where(
        and(
          eq(jobPhoto.id, photoId),
          isNull(job.deletedAt),
          reachable(jobPhoto.deletedAt, deleted),
          jobVisible(),
        ),
      ),
};
