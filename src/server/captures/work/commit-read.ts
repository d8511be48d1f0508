import { and, eq, sql } from 'drizzle-orm';
import type { PreviewLine, Reading } from '../../../engine/reading/types.ts';
import { capture, captureSignal, type StoredAxis } from '../../db/schema.ts';
import { QUEUES } from '../../queue/names.ts';
import { ownJob } from '../../queue/own-job.ts';
import type { TakenJob } from '../../queue/take-job.ts';
import { inTransaction } from '../../queue/transaction.ts';
import { Superseded } from './superseded.ts';

export interface ReadResult {
  readonly reading: Reading;
  readonly preview: readonly PreviewLine[];
  readonly axis: StoredAxis;
  readonly samples: number;
  readonly signals: readonly Omit<typeof captureSignal.$inferSelect, 'captureId'>[];
  readonly sha256: string | null;
}

/** Samples that a row named before stay this long, for those who are just reading them. */
const DROP_AFTER_S = 600;

/** The new samples become those of the capture; from here on the trace can be drawn, while it is being measured. */
export async function commitRead(
  job: TakenJob,
  at: { readonly id: string; readonly revision: number },
  samplesVersion: number,
  read: ReadResult,
): Promise<void> {
  await inTransaction(async ({ tx, send, queueDb }) => {
    await ownJob(queueDb, job);
    const [row] = await tx
      .update(capture)
      .set({
        status: 'measuring',
        progress: 0,
        error: null,
        samplesVersion,
        axis: read.axis,
        samples: read.samples,
        reading: read.reading,
        preview: [...read.preview],
        ...(read.sha256 === null ? {} : { sha256: read.sha256 }),
        updatedAt: sql`now()`,
      })
      .where(and(eq(capture.id, at.id), eq(capture.revision, at.revision), eq(capture.status, 'reading')))
      .returning({ id: capture.id });
    if (row === undefined) throw new Superseded(`Capture ${at.id} was changed or stopped while it was read`);
    await tx.delete(captureSignal).where(eq(captureSignal.captureId, at.id));
    if (read.signals.length > 0) {
      await tx.insert(captureSignal).values(read.signals.map((signal) => ({ ...signal, captureId: at.id })));
    }
    await send(QUEUES.dropSamples, { captureId: at.id }, { startAfter: DROP_AFTER_S, singletonKey: at.id });
  });
}
