import { and, eq } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { exercise, membership } from '../../db/schema.ts';
import { memberOf, reachable } from '../conditions.ts';
import type { Door } from '../door.ts';
import { exerciseVisible } from '../teaching-conditions.ts';

/** An exercise and the role that the caller holds in its workshop: what is shown of it depends on that. */
export type ExerciseRecord = typeof exercise.$inferSelect & {
  readonly heldRole: typeof membership.$inferSelect.role;
};

/** An exercise: for instructors and owners of its workshop, and for whom it is set. */
export const exerciseDoor: Door<ExerciseRecord> = {
  find: async (person, thingId, { deleted }) => {
    const rows = await db()
      .select({ thing: exercise, role: membership.role, madeBy: exercise.createdBy })
      .from(exercise)
      .innerJoin(membership, memberOf(person, exercise.workshopId))
      .where(
        and(
          eq(exercise.id, thingId),
          reachable(exercise.deletedAt, deleted),
          exerciseVisible(person.personId, membership.role),
        ),
      );
    return rows.map((row) => ({ ...row, thing: { ...row.thing, heldRole: row.role } }));
  },
};
