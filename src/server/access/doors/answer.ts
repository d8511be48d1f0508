import { and, eq, isNull } from 'drizzle-orm';
import { db } from '../../db/client.ts';
import { answer, capture, membership } from '../../db/schema.ts';
import { captureVisible, memberOf } from '../conditions.ts';
import type { Door } from '../door.ts';

export type AnswerRecord = typeof answer.$inferSelect;

/** An answer, through its capture. */
export const answerDoor: Door<AnswerRecord> = {
  find: (person, thingId) =>
    db()
      .select({ thing: answer, role: membership.role, madeBy: capture.createdBy })
      .from(answer)
      .innerJoin(capture, eq(capture.id, answer.captureId))
      .innerJoin(membership, memberOf(person, capture.workshopId))
      .where(
        and(
          eq(answer.id, thingId),
          isNull(capture.deletedAt),
          captureVisible(person.personId, membership.role),
        ),
      ),
};
