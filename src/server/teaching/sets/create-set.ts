import type { z } from 'zod';
import type { setInput } from '../../../contract/areas/teaching.ts';
import type { PersonCaller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { teachingSet } from '../../db/schema.ts';
import { newId } from '../../ids.ts';
import { writePeople } from './write-people.ts';

/** Makes a set without items in the current workshop. Gives its id. */
export async function createSet(caller: PersonCaller, input: z.output<typeof setInput>): Promise<string> {
  const id = newId();
  const { people, ...fields } = input;
  await db().transaction(async (tx) => {
    await tx
      .insert(teachingSet)
      .values({ id, workshopId: caller.workshopId, createdBy: caller.personId, ...fields });
    await writePeople(tx, id, caller.workshopId, people);
  });
  return id;
}
