import { eq, sql } from 'drizzle-orm';
import type { ExerciseRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { exercise } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';

/** Brings an exercise back; one that is there stays as it is. */
export async function restoreExercise(row: ExerciseRecord): Promise<ExerciseRecord> {
  if (row.deletedAt === null) return row;
  const [back] = await db()
    .update(exercise)
    .set({ deletedAt: null, edition: sql`${exercise.edition} + 1`, updatedAt: sql`now()` })
    .where(eq(exercise.id, row.id))
    .returning();
  if (back === undefined) throw new ApiError('not_found');
  return { ...back, heldRole: row.heldRole };
}
