import { eq, inArray, type SQL, sql } from 'drizzle-orm';
import type { SetRowJson } from '../../../contract/areas/teaching.ts';
import type { Role } from '../../../contract/roles.ts';
import { exerciseVisible, type PersonCaller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { exercise, person, teachingSet } from '../../db/schema.ts';
import { etagOf } from '../../http/etag.ts';

/** Learners whom a set is for: all of its workshop, or those named. */
const learners: SQL = sql`(select count(*)::int from membership m where m.workshop_id = ${teachingSet.workshopId}
  and m.role = 'learner' and (${teachingSet.audience} = 'everyone' or (${teachingSet.audience} = 'named' and exists
  (select 1 from teaching_set_person sp where sp.set_id = ${teachingSet.id} and sp.person_id = m.person_id))))`;

/** What a row of the list says of each set named, for this caller with the role held in the sets' workshop. */
export async function setRows(
  ids: readonly string[],
  caller: PersonCaller,
  role: Role,
): Promise<Map<string, SetRowJson>> {
  if (ids.length === 0) return new Map();
  const staff = role === 'owner' || role === 'instructor';
  const inSet = sql`exists (select 1 from teaching_set_item si where si.set_id = ${teachingSet.id} and si.exercise_id = ${exercise.id})`;
  const visible = sql`${exercise.deletedAt} is null and ${exerciseVisible(caller.personId, role)}`;
  const attemptsBy = (
    who: SQL,
  ) => sql<number>`(select count(*)::int from attempt a join exercise on exercise.id = a.exercise_id
    where exercise.deleted_at is null and ${inSet} and ${who})`;
  const rows = await db()
    .select({
      row: teachingSet,
      setBy: person.name,
      exercises: sql<number>`(select count(*)::int from exercise where ${inSet} and ${visible})`,
      answered: attemptsBy(sql`a.person_id = ${caller.personId}`),
      given: attemptsBy(
        sql`exists (select 1 from membership m where m.person_id = a.person_id and m.workshop_id = ${teachingSet.workshopId} and m.role = 'learner')`,
      ),
      learners: sql<number>`${learners}`,
    })
    .from(teachingSet)
    .innerJoin(person, eq(person.id, teachingSet.createdBy))
    .where(inArray(teachingSet.id, [...ids]));
  return new Map(
    rows.map(({ row, setBy, exercises, answered, given, learners: count }) => [
      row.id,
      {
        id: row.id,
        title: row.title,
        intro: row.intro,
        state: row.state,
        audience: row.audience,
        setBy,
        exercises,
        answered,
        tried: staff ? { given, possible: exercises * count, learners: count } : null,
        createdAt: row.createdAt.toISOString(),
        etag: etagOf(row.edition),
      },
    ]),
  );
}
