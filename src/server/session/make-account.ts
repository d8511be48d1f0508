import { eq } from 'drizzle-orm';
import type { Executor } from '../db/client.ts';
import { membership, person, workshop } from '../db/schema.ts';
import { newId } from '../ids.ts';
import { recordAudit } from '../workshop/audit.ts';

export interface NewAccount {
  readonly email: string;
  readonly name: string;
  readonly workshop: string;
  readonly passwordHash: string;
}

/** Makes a person and their workshop with them as owner. Null when the address has an account. */
export async function makeAccount(
  tx: Executor,
  account: NewAccount,
  address: string,
): Promise<string | null> {
  const made = await makePerson(tx, account);
  if (made === null) return null;
  const { name } = account;
  const workshopId = newId();
  await tx.insert(workshop).values({ id: workshopId, name: account.workshop });
  await tx.insert(membership).values({ personId: made.id, workshopId, role: 'owner' });
  await tx.update(person).set({ currentWorkshopId: workshopId }).where(eq(person.id, made.id));
  const entry = {
    workshopId,
    personId: made.id,
    who: name,
    action: 'workshop made',
    subject: account.workshop,
    address,
  };
  await recordAudit(entry, tx);
  return made.id;
}

/** Makes a person without a workshop. Null when the address has an account. */
export async function makePerson(
  tx: Executor,
  { email, name, passwordHash }: Omit<NewAccount, 'workshop'>,
): Promise<{ id: string } | null> {
  const [made] = await tx
    .insert(person)
    .values({ id: newId(), email, name, passwordHash })
    .onConflictDoNothing({ target: person.email })
    .returning({ id: person.id });
  return made ?? null;
}
