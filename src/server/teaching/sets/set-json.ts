import { asc, eq } from 'drizzle-orm';
import type { SetJson } from '../../../contract/areas/teaching.ts';
import type { PersonCaller, SetRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { person, teachingSetPerson } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { setItems } from './set-items.ts';
import { setRows } from './set-rows.ts';

/** A set with its items, as this caller sees it. */
export async function setJson(row: SetRecord, caller: PersonCaller): Promise<SetJson> {
  const staff = row.heldRole === 'owner' || row.heldRole === 'instructor';
  const [rows, items, people] = await Promise.all([
    setRows([row.id], caller, row.heldRole),
    setItems(row, caller),
    staff
      ? db()
          .select({ id: person.id, name: person.name })
          .from(teachingSetPerson)
          .innerJoin(person, eq(person.id, teachingSetPerson.personId))
          .where(eq(teachingSetPerson.setId, row.id))
          .orderBy(asc(person.name), asc(person.id))
      : [],
  ]);
  const found = rows.get(row.id);
  if (found === undefined) throw new ApiError('not_found');
  return { ...found, people, items };
}
