import { count, eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { answerInput } from '../../../contract/areas/sharing.ts';
import type { ShareCaller } from '../../access.ts';
import { answer, shareLink } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { limitAnswers } from '../../http/limits.ts';
import { newId } from '../../ids.ts';
import { mailAnswer } from '../../mail/answer-mail.ts';
import { inTransaction } from '../../queue/transaction.ts';
import { addMark } from '../marks/create-mark.ts';

/** A link takes this many answers in all, hidden ones included. */
export const ANSWERS_LIMIT = 200;

/** Answers the question of a link, with a mark if one was set. */
export async function addAnswer(
  caller: ShareCaller,
  input: z.output<typeof answerInput>,
  address: string,
): Promise<{ id: string; name: string; text: string; createdAt: string }> {
  await limitAnswers(caller.linkId, address);
  return inTransaction(async (transaction) => {
    const { tx } = transaction;
    const [link] = await tx.select().from(shareLink).where(eq(shareLink.id, caller.linkId)).for('update');
    if (link === undefined || link.withdrawnAt !== null) throw new ApiError('link_ended');
    const [given] = await tx.select({ total: count() }).from(answer).where(eq(answer.shareLinkId, link.id));
    if ((given?.total ?? 0) >= ANSWERS_LIMIT) {
      throw new ApiError('conflict', {
        message: `This link has taken ${ANSWERS_LIMIT} answers and takes no more.`,
        hint: 'Ask the person who sent it for a new one.',
      });
    }
    const id = newId();
    const [made] = await tx
      .insert(answer)
      .values({ id, shareLinkId: link.id, captureId: link.captureId, name: input.name, text: input.text })
      .returning();
    if (made === undefined) throw new Error('the answer was not returned');
    if (input.mark) {
      const author = { name: input.name, personId: null, answerId: id };
      await addMark(tx, link.captureId, author, input.mark, 'mark.');
    }
    await mailAnswer(transaction, { linkId: caller.linkId, ...input });
    return { id, name: made.name, text: made.text, createdAt: made.createdAt.toISOString() };
  });
}
