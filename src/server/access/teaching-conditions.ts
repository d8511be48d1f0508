import { type Placeholder, type SQL, sql } from 'drizzle-orm';
import type { Role } from '../../contract/roles.ts';
import { attempt, capture, exercise, type membership } from '../db/schema.ts';

/** A role as a value, or the membership's column, for use in a condition. */
export type HeldRole = Role | typeof membership.role;
export const heldSql = (role: HeldRole): SQL =>
  typeof role === 'string' ? sql`${role}::text` : sql`${role}`;

/** A person's id, or its place in a prepared statement. */
type PersonId = string | Placeholder;

const isStaff = (role: HeldRole): SQL => sql`${heldSql(role)} in ('owner', 'instructor')`;

/** That a set, under the alias given, is set for a person: open, not hidden, for everybody or for them by name. */
const setFor = (alias: string, personId: PersonId): SQL => {
  const s = sql.raw(alias);
  return sql`(${s}.state = 'open' and ${s}.deleted_at is null and (${s}.audience = 'everyone' or (${s}.audience = 'named'
    and exists (select 1 from teaching_set_person sp where sp.set_id = ${s}.id and sp.person_id = ${personId}))))`;
};

/** Instructors and owners see every set; others those that are set for them. */
export const setVisible = (personId: string, role: HeldRole): SQL =>
  sql`(${isStaff(role)} or ${setFor('teaching_set', personId)})`;

const inSetFor = (what: SQL, personId: PersonId): SQL => sql`exists (select 1 from teaching_set_item si
  join teaching_set s on s.id = si.set_id where ${what} and ${setFor('s', personId)})`;

/** Instructors and owners see every exercise; others the open ones of their sets, and always those that they answered. */
export const exerciseVisible = (personId: string, role: HeldRole): SQL => sql`(${isStaff(role)}
  or (${exercise.state} = 'open' and ${inSetFor(sql`si.exercise_id = ${exercise.id}`, personId)})
  or exists (select 1 from ${attempt} where ${attempt.exerciseId} = ${exercise.id} and ${attempt.personId} = ${personId}))`;

/** That a capture stands in a set for the person, or is what an exercise rested on that they have answered. */
export const captureSetFor = (
  personId: PersonId,
): SQL => sql`(${inSetFor(sql`si.capture_id = ${capture.id}`, personId)}
  or exists (select 1 from exercise e join attempt a on a.exercise_id = e.id and a.person_id = ${personId}
    where e.capture_id = ${capture.id} and e.deleted_at is null))`;

/**
 * That a trace is kept from a learner: an open exercise rests on it that they have not answered. The same file under
 * another capture counts too. One's own upload is kept back only from whom the exercise is set for.
 */
export const captureWithheld = (personId: PersonId): SQL => sql`exists (select 1 from exercise e
  where e.workshop_id = ${capture.workshopId} and e.state = 'open' and e.deleted_at is null
    and (e.capture_id = ${capture.id} or (e.capture_sha256 = ${capture.sha256} and ${capture.createdBy} <> ${personId}))
    and (${capture.createdBy} <> ${personId} or ${inSetFor(sql`si.exercise_id = e.id`, personId)})
    and not exists (select 1 from attempt a where a.exercise_id = e.id and a.person_id = ${personId}))`;

/** The same for what was made from a capture and names it, such as a known-good: kept back from learners. */
export const madeFromWithheld = (
  captureId: SQL,
  personId: string,
  role: HeldRole,
): SQL => sql`(${heldSql(role)} = 'learner'
  and exists (select 1 from ${capture} where ${capture.id} = ${captureId} and ${captureWithheld(personId)}))`;
