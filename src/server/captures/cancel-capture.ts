import { and, eq, inArray } from 'drizzle-orm';
import type { CaptureRecord } from '../access.ts';
import { capture } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { inTransaction } from '../queue/transaction.ts';

/** The channel on which workers hear that a capture's work is to stop. */
export const STOP_CHANNEL = 'gapmark_stop';

/** Stops reading or measuring. The original stays, and so does what was measured before. */
export async function cancelCapture(row: CaptureRecord): Promise<CaptureRecord> {
  return inTransaction(async ({ tx, queueDb }) => {
    const [stopped] = await tx
      .update(capture)
      .set({ status: 'cancelled', progress: 0, updatedAt: new Date() })
      .where(and(eq(capture.id, row.id), inArray(capture.status, ['queued', 'reading', 'measuring'])))
      .returning();
    if (stopped === undefined) {
      throw new ApiError('conflict', {
        message: 'Nothing is being read or measured here that could be stopped.',
      });
    }
    await queueDb.executeSql('select pg_notify($1, $2)', [STOP_CHANNEL, row.id]);
    return stopped;
  });
}
