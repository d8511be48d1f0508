import { and, asc, desc, eq, isNull } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { capture, exercise, membership, person } from '../../db/schema.ts';

/** More than this many are not offered in a list to choose from. */
const MOST = 500;

/** What a set of this workshop may hold and whom it may be for, for an instructor who builds one. */
export async function setChoices(workshopId: string) {
  const [learners, exercises, captures] = await Promise.all([
    db()
      .select({ id: person.id, name: person.name })
      .from(membership)
      .innerJoin(person, eq(person.id, membership.personId))
      .where(and(eq(membership.workshopId, workshopId), eq(membership.role, 'learner')))
      .orderBy(asc(person.name), asc(person.id))
      .limit(MOST),
    db()
      .select({ id: exercise.id, title: exercise.title, state: exercise.state })
      .from(exercise)
      .where(and(eq(exercise.workshopId, workshopId), isNull(exercise.deletedAt)))
      .orderBy(desc(exercise.createdAt))
      .limit(MOST),
    db()
      .select({ id: capture.id, title: capture.title })
      .from(capture)
      .where(and(eq(capture.workshopId, workshopId), isNull(capture.deletedAt), eq(capture.status, 'ready')))
      .orderBy(desc(capture.createdAt))
      .limit(MOST),
  ]);
  return {
    learners,
    exercises: exercises.map(({ id, title, state }) => ({
      id,
      title: state === 'open' ? title : `${title} (${state})`,
    })),
    captures,
  };
}
