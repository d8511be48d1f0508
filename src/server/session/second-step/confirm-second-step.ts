import { and, eq, isNull, sql } from 'drizzle-orm';
import type { Cookie } from 'lucia';
import type { PersonCaller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { secondStep } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { forgetSignInTries, limitSignIn } from '../../http/limits.ts';
import { unseal } from '../../seal.ts';
import { auditedBy, recordAudit } from '../../workshop/audit.ts';
import type { Browser } from '../browser.ts';
import { renewSession } from '../lucia.ts';
import { replaceRecoveryCodes } from './recovery-codes.ts';
import { stepOfCode } from './totp.ts';

/** Takes the new key into use when the code is one of it: from now on signing in takes a code. Other sessions end. */
export async function confirmSecondStep(
  caller: PersonCaller,
  typed: string,
  browser: Browser,
): Promise<{ recoveryCodes: string[]; cookie: Cookie }> {
  const { personId } = caller;
  await limitSignIn(`confirm ${personId}`, browser.address);
  const recoveryCodes = await db().transaction(async (tx) => {
    const waiting = and(eq(secondStep.personId, personId), isNull(secondStep.confirmedAt));
    const [row] = await tx.select().from(secondStep).where(waiting).for('update');
    if (row === undefined)
      throw new ApiError('conflict', {
        message: 'There is no key that waits for its first code. Begin again.',
      });
    const step = stepOfCode(unseal('second step', row.sealed), typed.replace(/\s/g, ''), Date.now());
    if (step === null)
      throw new ApiError('invalid', {
        message: 'This is not the code of the new key.',
        hint: 'Codes change every 30 seconds. Check that the clock of your phone is right.',
        details: [{ path: 'code', message: 'is not the code of the new key' }],
      });
    await tx.update(secondStep).set({ confirmedAt: sql`now()`, lastStep: step }).where(waiting);
    const entry = { ...auditedBy(caller, caller.workshopId, browser.address), subject: '' };
    await recordAudit({ ...entry, action: 'second sign-in step switched on' }, tx);
    return replaceRecoveryCodes(tx, personId);
  });
  await forgetSignInTries(`confirm ${personId}`, browser.address);
  return { recoveryCodes, cookie: await renewSession(personId, browser) };
}
