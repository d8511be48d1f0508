import { eq } from 'drizzle-orm';
import { mailedLink, person } from '../db/schema.ts';
import { limitMailAsked, mayMailAccount } from '../http/limits.ts';
import { hashSecret, newSecret } from '../ids.ts';
import { queueMail } from '../mail/queue-mail.ts';
import { resetMail } from '../mail/reset-mail.ts';
import { inTransaction } from '../queue/transaction.ts';

const WITHIN_MS = 3_600_000;

/** Sends a link to set a new password, when the address has an account. Nothing that comes back tells whether it has. */
export async function askReset(email: string, address: string): Promise<void> {
  await limitMailAsked(address);
  const may = await mayMailAccount(email);
  await inTransaction(async (transaction) => {
    const { tx } = transaction;
    const [found] = await tx
      .select({ id: person.id, name: person.name, email: person.email })
      .from(person)
      .where(eq(person.email, email));
    if (found === undefined || !may) return;
    const secret = newSecret();
    const expiresAt = new Date(Date.now() + WITHIN_MS);
    await tx
      .insert(mailedLink)
      .values({ id: hashSecret(secret), kind: 'password', personId: found.id, expiresAt });
    await queueMail(transaction, resetMail(found, secret, expiresAt));
  });
}
