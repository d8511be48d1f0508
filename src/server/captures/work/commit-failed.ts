import { and, eq, inArray, sql } from 'drizzle-orm';
import type { CaptureJson } from '../../../contract/areas/captures.ts';
import type { PreviewLine } from '../../../engine/reading/types.ts';
import { capture } from '../../db/schema.ts';
import { completeJob, ownJob } from '../../queue/own-job.ts';
import type { TakenJob } from '../../queue/take-job.ts';
import { inTransaction } from '../../queue/transaction.ts';

export interface Failure {
  readonly error: NonNullable<CaptureJson['error']>;
  readonly preview?: readonly PreviewLine[];
  readonly sha256: string | null;
}

/** The file cannot be read: the sentence for the person, and the job is done. The original stays. */
export async function commitFailed(
  job: TakenJob,
  at: { readonly id: string; readonly revision: number },
  failure: Failure,
): Promise<void> {
  await inTransaction(async ({ tx, queueDb }) => {
    await ownJob(queueDb, job);
    await tx
      .update(capture)
      .set({
        status: 'failed',
        progress: 0,
        error: failure.error,
        ...(failure.preview === undefined ? {} : { preview: [...failure.preview] }),
        ...(failure.sha256 === null ? {} : { sha256: failure.sha256 }),
        updatedAt: sql`now()`,
      })
      .where(
        and(
          eq(capture.id, at.id),
          eq(capture.revision, at.revision),
          inArray(capture.status, ['queued', 'reading', 'measuring']),
        ),
      );
    await completeJob(queueDb, job);
  });
}
