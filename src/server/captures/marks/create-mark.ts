import { and, count, eq, isNull } from 'drizzle-orm';
import type { z } from 'zod';
import type { markInput } from '../../../contract/areas/marks.ts';
import type { MarkRecord } from '../../access.ts';
import type { Executor } from '../../db/client.ts';
import { capture, mark } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { newId } from '../../ids.ts';
import { inTransaction } from '../../queue/transaction.ts';
import { mailMentions } from '../../workshop/mentions/mail-mentions.ts';
import { checkSignal } from './check-signal.ts';

/** More would hide the trace; it also bounds the list. */
export const MARKS_LIMIT = 1_000;

interface Author {
  readonly name: string;
  /** Null for the holder of a link. */
  readonly personId: string | null;
  readonly answerId?: string;
}

/** Pins a person's mark to a capture, and tells those whom it names. */
export const createMark = (
  captureId: string,
  author: Author & { readonly personId: string },
  input: z.output<typeof markInput>,
): Promise<MarkRecord> =>
  inTransaction(async (transaction) => {
    const made = await addMark(transaction.tx, captureId, author, input);
    await mailMentions(transaction, { captureId, by: author, text: input.text });
    return made;
  });

/** The same within a transaction. `path` leads to the mark in what was sent. */
export async function addMark(
  tx: Executor,
  captureId: string,
  author: Author,
  input: z.output<typeof markInput>,
  path = '',
): Promise<MarkRecord> {
  // The capture's row is held, so that two at once cannot both take the last place.
  await tx.select({ id: capture.id }).from(capture).where(eq(capture.id, captureId)).for('update');
  const [present] = await tx
    .select({ total: count() })
    .from(mark)
    .where(and(eq(mark.captureId, captureId), isNull(mark.deletedAt)));
  if ((present?.total ?? 0) >= MARKS_LIMIT) {
    throw new ApiError('conflict', { message: `A capture takes ${MARKS_LIMIT} marks at most.` });
  }
  await checkSignal(tx, captureId, input.signal, `${path}signal`);
  const [made] = await tx
    .insert(mark)
    .values({
      id: newId(),
      captureId,
      createdBy: author.personId,
      author: author.name,
      answerId: author.answerId ?? null,
      kind: input.kind,
      signal: input.signal,
      fromS: input.from,
      toS: input.to,
      value: input.value,
      text: input.text,
    })
    .returning();
  if (made === undefined) throw new Error('the mark was not returned');
  return made;
}
