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
import { mailConfirmation } from '../mail/confirmation-mail.ts';
import { mailKnownAddress } from '../mail/known-address-mail.ts';
import { startSession } from './lucia.ts';
import { makeAccount, type NewAccount } from './make-account.ts';
import { hashPassword } from './password.ts';

export interface SignUpRequest extends z.output<typeof signUpInput> {
  readonly address: string;
  readonly cookieHeader: string | undefined;
}

const CONFIRM_WITHIN_MS = 24 * 3_600_000;

const taken = () =>
  new ApiError('conflict', {
    message: 'This e-mail address has an account. Sign in with it, or use another one.',
  });

/**
 * Sends a link that makes the account; a known address gets another mail, and the answer is the same, so that nobody can
 * find out who has an account here. Where no mail can be sent, the account is made at once and signed in.
 * @returns the session's cookie, or null when a mail was sent.
 */
export async function signUp(request: SignUpRequest): Promise<{ cookie: Cookie | null }> {
  if (config().signUp !== 'open') throw new ApiError('sign_up_closed');
  await limitSignUp(request.address);
  const { email, name, workshop } = request;
  const account: NewAccount = { email, name, workshop, passwordHash: await hashPassword(request.password) };
  if (await sentByMail(account)) return { cookie: null };
  const personId = await db().transaction((tx) => makeAccount(tx, account, request.address));
  if (personId === null) throw taken();
  return { cookie: await startSession(personId, request.cookieHeader) };
}

/** The row is there before the mail, so that a quick reader's link works; a row whose mail did not go is taken back. */
async function sentByMail(account: NewAccount): Promise<boolean> {
  if (config().mail.url === undefined) return false;
  const secret = newSecret();
  const id = hashSecret(secret);
  const expiresAt = new Date(Date.now() + CONFIRM_WITHIN_MS);
  await db()
    .insert(pendingSignUp)
    .values({ id, ...account, expiresAt });
  const [known] = await db().select({ id: person.id }).from(person).where(eq(person.email, account.email));
  const sent = await (known === undefined
    ? mailConfirmation(account, secret)
    : mailKnownAddress(account.email));
  if (!sent || known !== undefined) await db().delete(pendingSignUp).where(eq(pendingSignUp.id, id));
  return sent;
}
