import { eq } from 'drizzle-orm';
import type { Cookie } from 'lucia';
import { db } from '../db/client.ts';
import { person } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { forgetSignInTries, limitSignIn } from '../http/limits.ts';
import { recordAudit } from '../workshop/audit.ts';
import { startSession } from './lucia.ts';
import { verifyPassword } from './password.ts';

export interface SignInRequest {
  readonly email: string;
  readonly password: string;
  readonly address: string;
  /** The browser's Cookie header: the session that it names ends. */
  readonly cookieHeader: string | undefined;
}

/** Signs in; gives the person and the session’s cookie. Unknown and wrong get the same answer after the same work. */
export async function signIn(request: SignInRequest): Promise<{ personId: string; cookie: Cookie }> {
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
    if (found !== undefined) {
      await recordAudit({
        ...whoOf(found),
        action: 'sign-in refused',
        subject: '',
        address: request.address,
      });
    }
    throw new ApiError('wrong_sign_in');
  }
  await forgetSignInTries(request.email, request.address);
  const cookie = await startSession(found.id, request.cookieHeader);
  await recordAudit({ ...whoOf(found), action: 'signed in', subject: '', address: request.address });
  return { personId: found.id, cookie };
}

const whoOf = (found: { id: string; name: string; workshopId: string | null }) => ({
  workshopId: found.workshopId,
  personId: found.id,
  who: found.name,
});
