import { and, eq, isNull, sql } from 'drizzle-orm';
import type { ExerciseRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { exercise } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';

/** Takes an exercise away as it was opened; it can be brought back for 30 days, with what was answered. */
export async function deleteExercise(row: ExerciseRecord): Promise<void> {
  const [gone] = await db()
    .update(exercise)
    .set({ deletedAt: sql`now()`, edition: sql`${exercise.edition} + 1` })
    .where(and(eq(exercise.id, row.id), eq(exercise.edition, row.edition), isNull(exercise.deletedAt)))
    .returning({ id: exercise.id });
  if (gone === undefined) throw new ApiError('stale');
}
