import { and, eq, isNull } from 'drizzle-orm';
import type { z } from 'zod';
import type { attemptInput } from '../../../contract/areas/teaching.ts';
import type { ExerciseRecord, PersonCaller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { attempt, exercise } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { newId } from '../../ids.ts';
import { traceOf } from '../exercises/trace-of.ts';
import { versionOf } from '../exercises/version.ts';
import { markAttempt } from '../marking/mark-attempt.ts';

/**
 * Commits a person to an answer, once. Of two at the same moment the index lets one in and the other is told (409). The
 * exercise's row is held meanwhile, so that the version marked is the version that was open.
 * @throws ApiError conflict (answered already, not open, another version), invalid (a part is missing or unreadable).
 */
export async function commitAttempt(
  caller: PersonCaller,
  row: ExerciseRecord,
  input: z.output<typeof attemptInput>,
): Promise<void> {
  const { content } = await versionOf(row.id, row.version);
  const trace = await traceOf(content);
  await db().transaction(async (tx) => {
    const [now] = await tx
      .select({ state: exercise.state, version: exercise.version })
      .from(exercise)
      .where(and(eq(exercise.id, row.id), isNull(exercise.deletedAt)))
      .for('share');
    if (now === undefined) throw new ApiError('not_found');
    const [before] = await tx
      .select({ id: attempt.id })
      .from(attempt)
      .where(and(eq(attempt.exerciseId, row.id), eq(attempt.personId, caller.personId)));
    if (before !== undefined) throw alreadyAnswered();
    if (now.state !== 'open')
      throw new ApiError('conflict', {
        message:
          now.state === 'draft'
            ? 'This exercise is a draft; it takes no answers yet.'
            : 'This exercise was retracted; it takes no more answers.',
      });
    if (now.version !== row.version || (input.version !== undefined && input.version !== now.version))
      throw new ApiError('conflict', {
        message: 'The exercise was changed since you opened it. Nothing was counted.',
        hint: 'Load it anew, look again and then commit.',
      });
    if (trace === null)
      throw new ApiError('conflict', {
        message: 'The trace of this exercise is no longer there. Nothing was counted.',
      });
    const { answers, marks, outcome } = markAttempt(input, content, trace.toS - trace.fromS);
    const [made] = await tx
      .insert(attempt)
      .values({
        id: newId(),
        exerciseId: row.id,
        personId: caller.personId,
        version: now.version,
        answers,
        sure: input.sure,
        why: input.why,
        marks,
        outcome,
      })
      .onConflictDoNothing()
      .returning({ id: attempt.id });
    if (made === undefined) throw alreadyAnswered();
  });
}

const alreadyAnswered = () =>
  new ApiError('conflict', { message: 'You have committed your answer already; it counts once.' });
