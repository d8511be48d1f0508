import { queue } from './boss.ts';
import { ownJob } from './own-job.ts';
import type { TakenJob } from './take-job.ts';
import { inTransaction } from './transaction.ts';

/** Counts a failed attempt: the job comes again later, or is given up for good when it failed too often. */
export async function failJob(job: TakenJob): Promise<void> {
  const boss = await queue();
  await inTransaction(async ({ queueDb }) => {
    await ownJob(queueDb, job);
    await boss.fail(job.name, job.id, {}, { db: queueDb });
  });
}
