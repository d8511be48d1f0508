import { and, asc, eq, lt, sql } from 'drizzle-orm';
import { db } from '../db/client.ts';
import { job, jobEntry, jobPhoto } from '../db/schema.ts';
import { deleteObjects } from '../storage/delete-objects.ts';
import { photoKey, smallPhotoKey } from '../storage/keys.ts';

const LONG_AGO = sql`now() - interval '30 days'`;
const AT_A_TIME = 200;

/** Removes for good the jobs, notes and photos that were taken away 30 days ago; objects before the rows that name them. */
export async function sweepJobs(): Promise<void> {
  const jobs = await db()
    .select({ id: job.id })
    .from(job)
    .where(lt(job.deletedAt, LONG_AGO))
    .orderBy(asc(job.deletedAt))
    .limit(AT_A_TIME);
  for (const { id } of jobs) {
    await dropPhotos(eq(jobPhoto.jobId, id));
    await db()
      .delete(job)
      .where(and(eq(job.id, id), lt(job.deletedAt, LONG_AGO)));
  }
  await dropPhotos(lt(jobPhoto.deletedAt, LONG_AGO));
  await db().delete(jobEntry).where(lt(jobEntry.deletedAt, LONG_AGO));
}

async function dropPhotos(which: ReturnType<typeof eq>): Promise<void> {
  const due = await db().select({ id: jobPhoto.id }).from(jobPhoto).where(which).limit(AT_A_TIME);
  for (const { id } of due) {
    await deleteObjects([photoKey(id), smallPhotoKey(id)]);
    await db().delete(jobPhoto).where(eq(jobPhoto.id, id));
  }
}
