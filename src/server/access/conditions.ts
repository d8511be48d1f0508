import { and, eq, isNull, ne, or, type Placeholder, type SQL, sql } from 'drizzle-orm';
import type { PgColumn } from 'drizzle-orm/pg-core';
import { capture, membership } from '../db/schema.ts';
import type { PersonCaller } from './caller.ts';
import { captureSetFor, captureWithheld, type HeldRole, heldSql } from './teaching-conditions.ts';

/** Things hidden longer than this are gone. */
const RESTORABLE = sql`now() - interval '30 days'`;

/**
 * The condition under which a person sees a capture, given the role held in its workshop (a value, or the membership's
 * column): practice captures are for their maker, instructors and owners. A learner sees their own and what is set for
 * them, and nothing that an open exercise rests on until they have answered it.
 */
export function captureVisible(personId: string | Placeholder, role: HeldRole): SQL {
  const own = eq(capture.createdBy, personId);
  const held = heldSql(role);
  return sql`(${held} in ('owner', 'instructor')
    or (${held} = 'technician' and (not ${capture.practice} or ${own}))
    or (${held} = 'learner' and ((${capture.practice} and ${own}) or ${captureSetFor(personId)})
      and not ${captureWithheld(personId)}))`;
}

/** Membership in the thing's workshop: any of a session's person, the token's only for tokens. */
export function memberOf(person: PersonCaller, workshopId: PgColumn): SQL | undefined {
  return and(
    eq(membership.workshopId, workshopId),
    eq(membership.personId, person.personId),
    person.via === 'token' ? eq(membership.workshopId, person.workshopId) : undefined,
  );
}

/** Jobs and what belongs to them do not exist for learners. */
export const jobVisible = (): SQL => ne(membership.role, 'learner');

/** Not hidden, or hidden so lately that it can still be brought back. */
export const reachable = (deletedAt: PgColumn, deleted = false): SQL | undefined =>
  deleted ? or(isNull(deletedAt), sql`${deletedAt} > ${RESTORABLE}`) : isNull(deletedAt);
