import { and, eq } from 'drizzle-orm';
import type { PersonCaller } from '../access.ts';
import { mailedLink, person } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { limitMailAsked, mayMailAccount } from '../http/limits.ts';
import { hashSecret, newSecret } from '../ids.ts';
import { newAddressMail } from '../mail/email-change-mails.ts';
import { knownAddressMail } from '../mail/known-address-mail.ts';
import { mailWorks, queueMail } from '../mail/queue-mail.ts';
import { inTransaction } from '../queue/transaction.ts';
import { checkPassword } from './check-password.ts';

const WITHIN_MS = 24 * 3_600_000;

/** Sends a link to the new address that takes it into use. One that has an account is told so, and the answer is the same. */
export async function askEmailChange(
  caller: PersonCaller,
  given: { readonly email: string; readonly password: string },
  address: string,
): Promise<void> {
  if (!mailWorks())
    throw new ApiError('conflict', {
      message: 'This server sends no mail, so a new address cannot be confirmed. The present one stays.',
    });
  await checkPassword(caller.personId, given.password, address);
  await limitMailAsked(address);
  const may = await mayMailAccount(given.email);
  await inTransaction(async (transaction) => {
    const { tx } = transaction;
    const [known] = await tx.select({ id: person.id }).from(person).where(eq(person.email, given.email));
    if (!may) return;
    if (known !== undefined) return queueMail(transaction, knownAddressMail(given.email));
    const secret = newSecret();
    const expiresAt = new Date(Date.now() + WITHIN_MS);
    // Only the last one asked for works.
    await tx
      .delete(mailedLink)
      .where(and(eq(mailedLink.personId, caller.personId), eq(mailedLink.kind, 'email')));
    await tx.insert(mailedLink).values({
      id: hashSecret(secret),
      kind: 'email',
      personId: caller.personId,
      email: given.email,
      expiresAt,
    });
    await queueMail(transaction, newAddressMail(caller.name, given.email, secret, expiresAt));
  });
}
