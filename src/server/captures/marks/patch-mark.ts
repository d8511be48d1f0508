import { and, eq, isNull, sql } from 'drizzle-orm';
import { type MarkJson, markInput } from '../../../contract/areas/marks.ts';
import type { MarkRecord, PersonCaller } from '../../access.ts';
import { mark } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { checkIfMatch } from '../../http/etag.ts';
import { validate } from '../../http/validate.ts';
import { inTransaction } from '../../queue/transaction.ts';
import { mailMentions } from '../../workshop/mentions/mail-mentions.ts';
import { checkSignal } from './check-signal.ts';
import { markJson } from './mark-json.ts';

type MarkPatch = Partial<Pick<MarkJson, 'kind' | 'signal' | 'from' | 'to' | 'value' | 'text'>>;

/** Changes a mark; what comes out must be a whole mark. Somebody's change in between is 412 when an edition was named. */
export async function patchMark(
  row: MarkRecord,
  patch: MarkPatch,
  ifMatch: string | undefined,
  by: PersonCaller,
): Promise<MarkRecord> {
  return inTransaction(async (transaction) => {
    const { tx } = transaction;
    const [now] = await tx
      .select()
      .from(mark)
      .where(and(eq(mark.id, row.id), isNull(mark.deletedAt)))
      .for('update');
    if (now === undefined) throw new ApiError('not_found');
    checkIfMatch(ifMatch, now.edition);
    const whole = validate(markInput, { ...markJson(now), ...patch });
    if (whole.signal !== now.signal) await checkSignal(tx, row.captureId, whole.signal, 'signal');
    const [changed] = await tx
      .update(mark)
      .set({
        kind: whole.kind,
        signal: whole.signal,
        fromS: whole.from,
        toS: whole.to,
        value: whole.value,
        text: whole.text,
        edition: sql`${mark.edition} + 1`,
        updatedAt: sql`now()`,
      })
      .where(eq(mark.id, row.id))
      .returning();
    if (changed === undefined) throw new ApiError('not_found');
    await mailMentions(transaction, { captureId: row.captureId, by, text: whole.text, before: now.text });
    return changed;
  });
}
