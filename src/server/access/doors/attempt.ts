import { and, eq, isNull, or, sql } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { attempt, exercise, membership } from '../../db/schema.ts';
import { memberOf } from '../conditions.ts';
import type { Door } from '../door.ts';
import { heldSql } from '../teaching-conditions.ts';

/** An answer that somebody committed to, with the workshop of its exercise. */
export type AttemptRecord = typeof attempt.$inferSelect & { readonly workshopId: string };

/** An attempt: for instructors and owners, and for whom it belongs to. */
export const attemptDoor: Door<AttemptRecord> = {
  find: async (person, thingId) => {
    const rows = await db()
      .select({
        thing: attempt,
        role: membership.role,
        madeBy: attempt.personId,
        workshopId: exercise.workshopId,
      })
      .from(attempt)
      .innerJoin(exercise, eq(exercise.id, attempt.exerciseId))
      .innerJoin(membership, memberOf(person, exercise.workshopId))
      .where(
        and(
          eq(attempt.id, thingId),
          isNull(exercise.deletedAt),
          or(
            eq(attempt.personId, person.personId),
            sql`${heldSql(membership.role)} in ('owner', 'instructor')`,
          ),
        ),
      );
    return rows.map(({ workshopId, ...row }) => ({ ...row, thing: { ...row.thing, workshopId } }));
  },
};
