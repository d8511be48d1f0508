import { eq } from 'drizzle-orm';
import type { Cookie } from 'lucia';
import { db } from '../db/client.ts';
import { membership, person } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { forgetSignInTries, limitSignIn } from '../http/limits.ts';
import { recordAudit } from '../workshop/audit.ts';
import type { Browser } from './browser.ts';
import { startSession } from './lucia.ts';
import { verifyPassword } from './password.ts';
import { beginPendingSignIn } from './second-step/pending-sign-in.ts';
import { hasSecondStep } from './second-step/state.ts';

export interface SignInRequest extends Browser {
  readonly email: string;
  readonly password: string;
  /** Signs in to take an invitation: then a person who is in no workshop may. */
  readonly joining?: boolean;
}

export interface SignedIn {
  readonly personId: string;
  /** `code`: the cookie only remembers that the password was right, see complete-sign-in.ts. */
  readonly step: 'done' | 'code';
  readonly cookie: Cookie;
}

/** Signs in; gives the person and a cookie. Unknown and wrong get the same answer after the same work. */
export async function signIn(request: SignInRequest): Promise<SignedIn> {
  await limitSignIn(request.email, request.address);
  const [found] = await db()
    .select({
      id: person.id,
      name: person.name,
      passwordHash: person.passwordHash,
      workshopId: person.currentWorkshopId,
    })
    .from(person)
    .where(eq(person.email, request.email));
  const right = await verifyPassword(found?.passwordHash ?? null, request.password);
  if (found === undefined || !right) {
    if (found !== undefined) await noteSignIn(found, 'sign-in refused', request.address);
    throw new ApiError('wrong_sign_in');
  }
  await forgetSignInTries(request.email, request.address);
  if (!request.joining) await belongsSomewhere(found.id);
  if (await hasSecondStep(found.id))
    return { personId: found.id, step: 'code', cookie: await beginPendingSignIn(found.id) };
  const cookie = await startSession(found.id, request);
  await noteSignIn(found, 'signed in', request.address);
  return { personId: found.id, step: 'done', cookie };
}

async function belongsSomewhere(personId: string): Promise<void> {
  const [held] = await db()
    .select({ one: membership.personId })
    .from(membership)
    .where(eq(membership.personId, personId))
    .limit(1);
  if (held === undefined) throw new ApiError('no_workshop');
}

/** A line in the audit list of the workshop that the person is in. */
export const noteSignIn = (
  who: { readonly id: string; readonly name: string; readonly workshopId: string | null },
  action: string,
  address: string,
): Promise<void> =>
  recordAudit({ workshopId: who.workshopId, personId: who.id, who: who.name, action, subject: '', address });
