import { and, asc, eq, isNull, sql } from 'drizzle-orm';
import type { SetRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { attempt, exercise, exerciseVersion, membership, person, teachingSetItem } from '../../db/schema.ts';

/** The exercises of a set, in its order. */
export const exercisesOfSet = (setId: string) =>
  db()
    .select({ id: exercise.id, title: exercise.title })
    .from(teachingSetItem)
    .innerJoin(exercise, eq(exercise.id, teachingSetItem.exerciseId))
    .where(and(eq(teachingSetItem.setId, setId), isNull(exercise.deletedAt)))
    .orderBy(asc(teachingSetItem.position));

/** Everything that was answered in a set by those who learn, with the version that they answered. */
export const answersOfSet = (row: SetRecord) =>
  db()
    .select({ attempt, name: person.name, content: exerciseVersion.content })
    .from(teachingSetItem)
    .innerJoin(exercise, and(eq(exercise.id, teachingSetItem.exerciseId), isNull(exercise.deletedAt)))
    .innerJoin(attempt, eq(attempt.exerciseId, exercise.id))
    .innerJoin(
      exerciseVersion,
      and(eq(exerciseVersion.exerciseId, exercise.id), eq(exerciseVersion.version, attempt.version)),
    )
    .innerJoin(person, eq(person.id, attempt.personId))
    .leftJoin(
      membership,
      and(eq(membership.personId, attempt.personId), eq(membership.workshopId, row.workshopId)),
    )
    // Those who know the answers try an exercise out; that is no result.
    .where(
      and(
        eq(teachingSetItem.setId, row.id),
        sql`coalesce(${membership.role}, 'learner') not in ('owner', 'instructor')`,
      ),
    )
    .orderBy(asc(person.name), asc(person.id), asc(teachingSetItem.position));

/** Learners whom a set is for, by name. */
export const learnersOfSet = (row: SetRecord) =>
  db()
    .select({ id: person.id, name: person.name })
    .from(membership)
    .innerJoin(person, eq(person.id, membership.personId))
    .where(
      and(
        eq(membership.workshopId, row.workshopId),
        row.audience === 'nobody'
          ? sql`false`
          : row.audience === 'everyone'
            ? eq(membership.role, 'learner')
            : sql`exists (select 1 from teaching_set_person sp where sp.set_id = ${row.id} and sp.person_id = ${membership.personId})`,
      ),
    )
    .orderBy(asc(person.name), asc(person.id));
