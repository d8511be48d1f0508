import { connectionPool } from '../../db/client.ts';
import { completeJob } from '../../queue/own-job.ts';
import type { TakenJob } from '../../queue/take-job.ts';

/** Ends a job that has nothing to write. One that was taken by somebody else since is left alone. */
export async function endJob(job: TakenJob): Promise<void> {
  await completeJob({ executeSql: (text, values) => connectionPool().query(text, values) }, job);
}
