import { eq } from 'drizzle-orm';
import type { MailSwitch } from '../../contract/areas/people.ts';
import type { PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { person } from '../db/schema.ts';

interface Patch {
  readonly name?: string | undefined;
  readonly mutedMail?: readonly MailSwitch[] | undefined;
}

/** Changes one's own name, or which mails come. What was signed before keeps the name that it was signed with. */
export async function patchMe(caller: PersonCaller, { name, mutedMail }: Patch): Promise<void> {
  if (name === undefined && mutedMail === undefined) return;
  await db()
    .update(person)
    .set({
      ...(name === undefined ? {} : { name }),
      ...(mutedMail === undefined ? {} : { mutedMail: [...new Set(mutedMail)] }),
    })
    .where(eq(person.id, caller.personId));
}
