import { asc, eq } from 'drizzle-orm';
import type { MeJson } from '../../contract/areas/workshop.ts';
import type { PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { membership, person, workshop } from '../db/schema.ts';
import { ApiError } from '../errors.ts';

/** A person, the workshop they are in now, and all that they belong to. A token shows its own workshop only. */
export async function me(personId: string, via: MeJson['via'], tokenWorkshopId?: string): Promise<MeJson> {
  const rows = await db()
    .select({
      id: person.id,
      name: person.name,
      email: person.email,
      mutedMail: person.mutedMail,
      currentWorkshopId: person.currentWorkshopId,
      role: membership.role,
      workshop: { id: workshop.id, name: workshop.name, timeZone: workshop.timeZone },
    })
    .from(membership)
    .innerJoin(person, eq(person.id, membership.personId))
    .innerJoin(workshop, eq(workshop.id, membership.workshopId))
    .where(eq(membership.personId, personId))
    .orderBy(asc(membership.createdAt));
  const seen =
    tokenWorkshopId === undefined ? rows : rows.filter((row) => row.workshop.id === tokenWorkshopId);
  const here = seen.find((row) => row.workshop.id === row.currentWorkshopId) ?? seen[0];
  if (here === undefined)
    throw new ApiError('not_signed_in', { message: 'This account belongs to no workshop.' });
  return {
    id: here.id,
    name: here.name,
    email: here.email,
    role: here.role,
    workshop: here.workshop,
    workshops: seen.map((row) => ({ id: row.workshop.id, name: row.workshop.name, role: row.role })),
    via,
    mutedMail: here.mutedMail,
  };
}

/** The same for a caller. */
export const meOf = (caller: PersonCaller): Promise<MeJson> =>
  me(caller.personId, caller.via, caller.via === 'token' ? caller.workshopId : undefined);
