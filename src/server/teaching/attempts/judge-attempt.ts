import { and, eq, sql } from 'drizzle-orm';
import type { AttemptRecord, PersonCaller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { attempt } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { outcomeOf } from '../marking/outcome-of.ts';

interface Judgement {
  readonly mark: 'right' | 'partly' | 'wrong';
  readonly comment: string;
}

/**
 * Judges the free text of an answer, as it was opened: of two at once the second is told (412). It can be judged again.
 * @throws ApiError conflict when the answer has no text to judge.
 */
export async function judgeAttempt(caller: PersonCaller, row: AttemptRecord, { mark, comment }: Judgement) {
  if (row.marks.text === undefined)
    throw new ApiError('conflict', {
      message: 'This answer has no text to judge; the rest is marked by its numbers.',
    });
  const marks = { ...row.marks, text: { mark, why: `judged by ${caller.name}` } };
  const [changed] = await db()
    .update(attempt)
    .set({
      marks,
      outcome: outcomeOf(marks),
      comment,
      judgedBy: caller.personId,
      judgedAt: sql`now()`,
      edition: sql`${attempt.edition} + 1`,
    })
    .where(and(eq(attempt.id, row.id), eq(attempt.edition, row.edition)))
    .returning({ edition: attempt.edition });
  if (changed === undefined) throw new ApiError('stale');
  return changed.edition;
}
