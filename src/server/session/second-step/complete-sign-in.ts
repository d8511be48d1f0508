import { eq } from 'drizzle-orm';
import type { Cookie } from 'lucia';
import { db } from '../../db/client.ts';
import { pendingSignIn, person } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { forgetSignInTries, limitSignIn } from '../../http/limits.ts';
import type { Browser } from '../browser.ts';
import { startSession } from '../lucia.ts';
import { noteSignIn } from '../sign-in.ts';
import { endedPendingCookie, tryPendingSignIn } from './pending-sign-in.ts';
import { takeCode } from './take-code.ts';

/** The second step: takes the code of the person whose password was right in this browser, and signs in. */
export async function completeSignIn(
  typed: string,
  browser: Browser,
): Promise<{ personId: string; cookies: readonly Cookie[] }> {
  const pending = await tryPendingSignIn(browser.cookieHeader);
  if (pending === null) throw new ApiError('step_ended');
  const { personId } = pending;
  // Counted by person under a key of its own, so that new passwords given do not buy new tries at codes.
  await limitSignIn(`code ${personId}`, browser.address);
  const [who] = await db()
    .select({ id: person.id, name: person.name, workshopId: person.currentWorkshopId })
    .from(person)
    .where(eq(person.id, personId));
  if (who === undefined) throw new ApiError('step_ended');
  const how = await db().transaction(async (tx) => {
    const taken = await takeCode(tx, personId, typed);
    if (taken !== null) await tx.delete(pendingSignIn).where(eq(pendingSignIn.id, pending.id));
    return taken;
  });
  if (how === null) {
    await noteSignIn(who, 'sign-in code refused', browser.address);
    throw new ApiError('wrong_code');
  }
  await forgetSignInTries(`code ${personId}`, browser.address);
  const session = await startSession(personId, browser);
  await noteSignIn(
    who,
    how === 'recovery code' ? 'signed in with a recovery code' : 'signed in',
    browser.address,
  );
  return { personId, cookies: [session, endedPendingCookie()] };
}
