import { and, count, eq, isNotNull } from 'drizzle-orm';
import type { SecondStepJson } from '../../../contract/areas/people.ts';
import { db } from '../../db/client.ts';
import { recoveryCode, secondStep } from '../../db/schema.ts';

/** Whether this person's sign-in takes a code. */
export async function hasSecondStep(personId: string): Promise<boolean> {
  const [row] = await db()
    .select({ one: secondStep.personId })
    .from(secondStep)
    .where(and(eq(secondStep.personId, personId), isNotNull(secondStep.confirmedAt)));
  return row !== undefined;
}

/** The same for showing, with how many recovery codes are left. */
export async function secondStepState(personId: string): Promise<SecondStepJson> {
  const [on, [left]] = await Promise.all([
    hasSecondStep(personId),
    db().select({ total: count() }).from(recoveryCode).where(eq(recoveryCode.personId, personId)),
  ]);
  return { on, recoveryCodesLeft: on ? (left?.total ?? 0) : 0 };
}
