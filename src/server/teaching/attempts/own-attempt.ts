import { and, eq } from 'drizzle-orm';
import type { AttemptJson } from '../../../contract/areas/teaching.ts';
import { db, type Executor } from '../../db/client.ts';
import { attempt, person } from '../../db/schema.ts';
import { attemptJson } from './attempt-json.ts';

/** What a person committed to on an exercise, if they did. */
export async function ownAttempt(
  exerciseId: string,
  personId: string,
  on: Executor = db(),
): Promise<AttemptJson | null> {
  const [found] = await on
    .select({ row: attempt, judge: person.name })
    .from(attempt)
    .leftJoin(person, eq(person.id, attempt.judgedBy))
    .where(and(eq(attempt.exerciseId, exerciseId), eq(attempt.personId, personId)));
  return found === undefined ? null : attemptJson(found.row, found.judge);
}
