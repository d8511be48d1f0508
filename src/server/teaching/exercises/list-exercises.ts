import { and, desc, eq, isNull, sql } from 'drizzle-orm';
import type { ExerciseRowJson } from '../../../contract/areas/teaching.ts';
import { exerciseVisible, type PersonCaller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { attempt, capture, exercise, exerciseVersion } from '../../db/schema.ts';
import { decodeTimeCursor, page } from '../../http/cursor.ts';
import { olderThan, timeKey } from '../../http/keyset.ts';

/** Exercises of the current workshop that the caller sees, newest first. */
export async function listExercises(
  caller: PersonCaller,
  query: { readonly limit: number; readonly cursor?: string | undefined },
) {
  const staff = caller.role === 'owner' || caller.role === 'instructor';
  const after = decodeTimeCursor(query.cursor);
  const attempts = (condition = sql`true`) =>
    sql<number>`(select count(*)::int from attempt a where a.exercise_id = ${exercise.id} and ${condition})`;
  const rows = await db()
    .select({
      row: exercise,
      captureTitle: capture.title,
      outcome: attempt.outcome,
      answer: sql<string>`${exerciseVersion.content} -> 'answer' ->> 'sentence'`,
      attempts: attempts(),
      waiting: attempts(sql`a.outcome = 'waiting'`),
      key: timeKey(exercise.createdAt),
    })
    .from(exercise)
    .innerJoin(
      exerciseVersion,
      and(eq(exerciseVersion.exerciseId, exercise.id), eq(exerciseVersion.version, exercise.version)),
    )
    .leftJoin(capture, eq(capture.id, exercise.captureId))
    .leftJoin(attempt, and(eq(attempt.exerciseId, exercise.id), eq(attempt.personId, caller.personId)))
    .where(
      and(
        eq(exercise.workshopId, caller.workshopId),
        isNull(exercise.deletedAt),
        exerciseVisible(caller.personId, caller.role),
        olderThan(exercise.createdAt, exercise.id, after),
      ),
    )
    .orderBy(desc(exercise.createdAt), desc(exercise.id))
    .limit(query.limit + 1);
  const { items, nextCursor } = page(rows, query.limit, ({ key, row }) => ({ key, id: row.id }));
  return {
    items: items.map(
      ({ row, captureTitle, outcome, answer, attempts: given, waiting }): ExerciseRowJson => ({
        id: row.id,
        title: row.title,
        state: row.state,
        version: row.version,
        createdAt: row.createdAt.toISOString(),
        outcome,
        staff: staff ? { captureId: row.captureId, captureTitle, answer, attempts: given, waiting } : null,
      }),
    ),
    nextCursor,
  };
}
