import { and, eq, sql } from 'drizzle-orm';
import type { CaptureFindings } from '../../../engine/capture.ts';
import { capture, captureSignal, measurement } from '../../db/schema.ts';
import { completeJob, ownJob } from '../../queue/own-job.ts';
import type { TakenJob } from '../../queue/take-job.ts';
import { inTransaction } from '../../queue/transaction.ts';
import { queueCaptureMeasured } from '../../workshop/webhooks/queue-webhooks.ts';
import { Superseded } from './superseded.ts';

export interface MeasuredResult {
  readonly findings: CaptureFindings;
  readonly signals: readonly Omit<typeof captureSignal.$inferSelect, 'captureId'>[];
}

/**
 * Writes the values and ends the job. `background`: the capture was ready all the time and stays so (a newer engine measured
 * it again); else it becomes ready now.
 */
export async function commitMeasured(
  job: TakenJob,
  at: { readonly id: string; readonly revision: number; readonly samplesVersion: number },
  { findings, signals }: MeasuredResult,
  background: boolean,
): Promise<void> {
  await inTransaction(async ({ tx, send, queueDb }) => {
    await ownJob(queueDb, job);
    const [row] = await tx
      .update(capture)
      .set(
        background
          ? { status: 'ready' }
          : { status: 'ready', progress: 1, error: null, updatedAt: sql`now()` },
      )
      .where(
        and(
          eq(capture.id, at.id),
          eq(capture.revision, at.revision),
          eq(capture.samplesVersion, at.samplesVersion),
          eq(capture.status, background ? 'ready' : 'measuring'),
        ),
      )
      .returning({ workshopId: capture.workshopId, title: capture.title });
    if (row === undefined)
      throw new Superseded(`Capture ${at.id} was changed or stopped while it was measured`);
    for (const { index, ...signal } of background ? [] : signals) {
      await tx
        .update(captureSignal)
        .set(signal)
        .where(and(eq(captureSignal.captureId, at.id), eq(captureSignal.index, index)));
    }
    const values = {
      revision: at.revision,
      samplesVersion: at.samplesVersion,
      engine: findings.engine,
      signals: [...findings.signals],
      relations: [...findings.relations],
      wheel: findings.wheel,
      measuredAt: new Date(),
    };
    await tx
      .insert(measurement)
      .values({ captureId: at.id, ...values })
      .onConflictDoUpdate({ target: measurement.captureId, set: values });
    if (!background) {
      const about = { captureId: at.id, revision: at.revision, engine: findings.engine };
      await queueCaptureMeasured({ tx, send }, { ...row, ...about });
    }
    await completeJob(queueDb, job);
  });
}
