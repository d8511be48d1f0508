import { and, eq, isNull } from 'drizzle-orm';
import type { Executor } from '../db/client.ts';
import { job } from '../db/schema.ts';
import { ApiError } from '../errors.ts';

/** Whether the workshop has this job, and it is not hidden. */
export async function hasJob(on: Executor, workshopId: string, jobId: string): Promise<boolean> {
  const found = await on
    .select({ id: job.id })
    .from(job)
    .where(and(eq(job.id, jobId), eq(job.workshopId, workshopId), isNull(job.deletedAt)))
    // Held until the link is written, so that the job is not swept meanwhile.
    .for('key share');
  return found.length > 0;
}

/** 422 unless a capture of this workshop may belong to the job. Practice captures belong to none. */
export async function checkJob(
  on: Executor,
  workshopId: string,
  jobId: string | null | undefined,
  practice: boolean,
): Promise<void> {
  if (jobId === null || jobId === undefined) return;
  if (!practice && (await hasJob(on, workshopId, jobId))) return;
  const message = practice ? 'a practice capture belongs to no job' : 'there is no such job';
  throw new ApiError('invalid', { details: [{ path: 'jobId', message }] });
}
