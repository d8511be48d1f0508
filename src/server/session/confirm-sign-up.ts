import { and, eq, gt } from 'drizzle-orm';
import type { Cookie } from 'lucia';
import { db } from '../db/client.ts';
import { pendingSignUp } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { limitSignUp } from '../http/limits.ts';
import { hashSecret } from '../ids.ts';
import type { Browser } from './browser.ts';
import { startSession } from './lucia.ts';
import { makeAccount } from './make-account.ts';

interface Confirmation extends Browser {
  readonly secret: string;
}

/** Makes what was asked for in the sign-up of this link, once, and signs in. */
export async function confirmSignUp(given: Confirmation): Promise<{ personId: string; cookie: Cookie }> {
  await limitSignUp(given.address);
  const personId = await db().transaction(async (tx) => {
    const [pending] = await tx
      .delete(pendingSignUp)
      .where(and(eq(pendingSignUp.id, hashSecret(given.secret)), gt(pendingSignUp.expiresAt, new Date())))
      .returning();
    if (pending === undefined)
      throw new ApiError('link_ended', {
        message:
          'This link was used before or is older than a day. If you have no account yet, sign up again.',
      });
    return makeAccount(tx, pending, given.address);
  });
  if (personId === null)
    throw new ApiError('conflict', { message: 'This address has an account by now. Sign in with it.' });
  return { personId, cookie: await startSession(personId, given) };
}
