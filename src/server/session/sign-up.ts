import { eq } from 'drizzle-orm';
import type { Cookie } from 'lucia';
import type { z } from 'zod';
import type { signUpInput } from '../../contract/areas/workshop.ts';
import { config } from '../config.ts';
import { db } from '../db/client.ts';
import { pendingSignUp, person } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { limitSignUp } from '../http/limits.ts';
import { hashSecret, newSecret } from '../ids.ts';
import { confirmationMail } from '../mail/confirmation-mail.ts';
import { knownAddressMail } from '../mail/known-address-mail.ts';
import { mailWorks, queueMail } from '../mail/queue-mail.ts';
import { inTransaction } from '../queue/transaction.ts';
import type { Browser } from './browser.ts';
import { startSession } from './lucia.ts';
import { makeAccount, type NewAccount } from './make-account.ts';
import { hashPassword } from './password.ts';

export interface SignUpRequest extends z.output<typeof signUpInput>, Browser {}

const CONFIRM_WITHIN_MS = 24 * 3_600_000;

const taken = () =>
  new ApiError('conflict', {
    message: 'This e-mail address has an account. Sign in with it, or use another one.',
  });

/**
 * Sends a link that makes the account; a known address gets another mail, and the answer is the same, so that nobody can
 * find out who has an account here. Where no mail can be sent, the account is made at once and signed in.
 * @returns the session's cookie, or null when a mail is on its way.
 */
export async function signUp(request: SignUpRequest): Promise<{ cookie: Cookie | null }> {
  if (config().signUp !== 'open') throw new ApiError('sign_up_closed');
  await limitSignUp(request.address);
  const { email, name, workshop } = request;
  const account: NewAccount = { email, name, workshop, passwordHash: await hashPassword(request.password) };
  if (mailWorks()) {
    await askByMail(account);
    return { cookie: null };
  }
  const personId = await db().transaction((tx) => makeAccount(tx, account, request.address));
  if (personId === null) throw taken();
  return { cookie: await startSession(personId, request) };
}

/** What is asked for and its mail, both or neither. */
const askByMail = (account: NewAccount): Promise<void> =>
  inTransaction(async (transaction) => {
    const { tx } = transaction;
    const [known] = await tx.select({ id: person.id }).from(person).where(eq(person.email, account.email));
    if (known !== undefined) return queueMail(transaction, knownAddressMail(account.email));
    const secret = newSecret();
    const expiresAt = new Date(Date.now() + CONFIRM_WITHIN_MS);
    await tx.insert(pendingSignUp).values({ id: hashSecret(secret), ...account, expiresAt });
    await queueMail(transaction, confirmationMail(account, secret, expiresAt));
  });
