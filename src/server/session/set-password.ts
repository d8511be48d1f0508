import { and, eq } from 'drizzle-orm';
import type { Executor } from '../db/client.ts';
import { mailedLink, pendingSignIn, person, session } from '../db/schema.ts';

/** Writes a person's new password. Their sessions, half sign-ins and reset links end with the old one. */
export async function setPassword(tx: Executor, personId: string, passwordHash: string) {
  const [who] = await tx.update(person).set({ passwordHash }).where(eq(person.id, personId)).returning({
    id: person.id,
    name: person.name,
    email: person.email,
    workshopId: person.currentWorkshopId,
  });
  await tx.delete(session).where(eq(session.userId, personId));
  await tx.delete(pendingSignIn).where(eq(pendingSignIn.personId, personId));
  await tx.delete(mailedLink).where(and(eq(mailedLink.personId, personId), eq(mailedLink.kind, 'password')));
  return who;
}
