import { and, asc, eq, inArray, isNull } from 'drizzle-orm';
import type { ExerciseJson } from '../../../contract/areas/teaching.ts';
import { type ExerciseRecord, exerciseVisible, type PersonCaller, setVisible } from '../../access.ts';
import { db } from '../../db/client.ts';
import { attempt, exercise, teachingSet, teachingSetItem } from '../../db/schema.ts';

/** Where an exercise stands in the sets that the caller sees: which of how many, what is done, what comes next. */
export async function setsOfExercise(
  row: ExerciseRecord,
  caller: PersonCaller,
): Promise<ExerciseJson['sets']> {
  const sets = await db()
    .selectDistinct({ id: teachingSet.id, title: teachingSet.title, createdAt: teachingSet.createdAt })
    .from(teachingSetItem)
    .innerJoin(teachingSet, eq(teachingSet.id, teachingSetItem.setId))
    .where(
      and(
        eq(teachingSetItem.exerciseId, row.id),
        isNull(teachingSet.deletedAt),
        setVisible(caller.personId, row.heldRole),
      ),
    )
    .orderBy(asc(teachingSet.createdAt), asc(teachingSet.id))
    .limit(20);
  if (sets.length === 0) return [];
  const items = await db()
    .select({ setId: teachingSetItem.setId, exerciseId: exercise.id, attemptId: attempt.id })
    .from(teachingSetItem)
    .innerJoin(exercise, eq(exercise.id, teachingSetItem.exerciseId))
    .leftJoin(attempt, and(eq(attempt.exerciseId, exercise.id), eq(attempt.personId, caller.personId)))
    .where(
      and(
        inArray(
          teachingSetItem.setId,
          sets.map(({ id }) => id),
        ),
        isNull(exercise.deletedAt),
        exerciseVisible(caller.personId, row.heldRole),
      ),
    )
    .orderBy(asc(teachingSetItem.position));
  return sets.map(({ id, title }) => {
    const own = items.filter(({ setId }) => setId === id);
    const at = own.findIndex(({ exerciseId }) => exerciseId === row.id);
    return {
      id,
      title,
      place: at + 1,
      of: own.length,
      next: own[at + 1]?.exerciseId ?? null,
      done: own.map(({ attemptId }) => attemptId !== null),
    };
  });
}
