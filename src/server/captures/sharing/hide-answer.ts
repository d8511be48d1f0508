import { and, eq, isNull, sql } from 'drizzle-orm';
import type { AnswerRecord, Caller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { answer, capture, mark } from '../../db/schema.ts';
import { auditedBy, recordAudit } from '../../workshop/audit.ts';

/** Hides an answer, and the mark that came with it, from the link and the list. */
export async function hideAnswer(caller: Caller, row: AnswerRecord, address: string): Promise<void> {
  await db().transaction(async (tx) => {
    const [hidden] = await tx
      .update(answer)
      .set({ hiddenAt: sql`now()` })
      .where(and(eq(answer.id, row.id), isNull(answer.hiddenAt)))
      .returning({ id: answer.id });
    if (hidden === undefined) return;
    await tx
      .update(mark)
      .set({ deletedAt: sql`now()`, edition: sql`${mark.edition} + 1` })
      .where(and(eq(mark.answerId, row.id), isNull(mark.deletedAt)));
    const [of] = await tx.select().from(capture).where(eq(capture.id, row.captureId));
    if (of === undefined) return;
    await recordAudit(
      { ...auditedBy(caller, of.workshopId, address), action: 'answer hidden', subject: of.title },
      tx,
    );
  });
}
