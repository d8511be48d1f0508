import { eq, sql } from 'drizzle-orm';
import type { Cookie } from 'lucia';
import { db, type Executor } from '../../db/client.ts';
import { invitation, membership, person } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { limitSignUp } from '../../http/limits.ts';
import type { Browser } from '../../session/browser.ts';
import { personOfCookie, startSession } from '../../session/lucia.ts';
import { makePerson } from '../../session/make-account.ts';
import { hashPassword } from '../../session/password.ts';
import { recordAudit } from '../audit.ts';
import { type OpenInvitation, openInvitation } from './open-invitation.ts';

interface Acceptance {
  readonly secret: string;
  /** For a new account. */
  readonly name?: string | undefined;
  readonly password?: string | undefined;
}

/**
 * Takes an invitation, once: whoever is signed in with the address invited joins; an address without an account gets one.
 * @returns the person, and the cookie of a new session where an account was made.
 */
export async function acceptInvitation(
  given: Acceptance,
  browser: Browser,
): Promise<{ personId: string; cookie: Cookie | null }> {
  await limitSignUp(browser.address);
  const signedIn = await personOfCookie(browser.cookieHeader);
  const passwordHash =
    signedIn === null && given.password !== undefined ? await hashPassword(given.password) : null;
  const { personId, isNew } = await db().transaction(async (tx) => {
    const invited = await openInvitation(given.secret, tx);
    const joining = await whoJoins(tx, invited, signedIn, given.name, passwordHash);
    await join(tx, invited, joining, browser.address);
    return { personId: joining.id, isNew: signedIn === null };
  });
  return { personId, cookie: isNew ? await startSession(personId, browser) : null };
}

interface Joining {
  readonly id: string;
  readonly name: string;
}

async function whoJoins(
  tx: Executor,
  invited: OpenInvitation,
  signedIn: { readonly id: string; readonly email: string; readonly name: string } | null,
  name: string | undefined,
  passwordHash: string | null,
): Promise<Joining> {
  if (signedIn !== null) {
    if (signedIn.email === invited.email) return signedIn;
    throw new ApiError('conflict', {
      message: `This invitation is for another address than ${signedIn.email}, with which you are signed in.`,
      hint: 'Sign out and open the link again, or ask for an invitation of your own address.',
    });
  }
  if (invited.hasAccount)
    throw new ApiError('conflict', {
      message: 'The address invited has an account.',
      hint: 'Sign in with it, then open the link again.',
    });
  if (name === undefined || passwordHash === null)
    throw new ApiError('invalid', {
      details: [
        ...(name === undefined ? [{ path: 'name', message: 'is needed for a new account' }] : []),
        ...(passwordHash === null ? [{ path: 'password', message: 'is needed for a new account' }] : []),
      ],
    });
  const made = await makePerson(tx, { email: invited.email, name, passwordHash });
  if (made === null)
    throw new ApiError('conflict', { message: 'The address has an account by now. Sign in.' });
  return { id: made.id, name };
}

async function join(tx: Executor, invited: OpenInvitation, who: Joining, address: string): Promise<void> {
  const { workshopId, role } = invited;
  await tx.update(invitation).set({ acceptedAt: sql`now()` }).where(eq(invitation.id, invited.id));
  // Somebody who is there already keeps the role held.
  await tx.insert(membership).values({ personId: who.id, workshopId, role }).onConflictDoNothing();
  await tx.update(person).set({ currentWorkshopId: workshopId }).where(eq(person.id, who.id));
  const entry = { workshopId, personId: who.id, who: who.name, action: 'joined', address };
  await recordAudit({ ...entry, subject: `as ${role}, invited by ${invited.invitedBy}` }, tx);
}
