import { eq } from 'drizzle-orm';
import type { Cookie } from 'lucia';
import type { PersonCaller } from '../../access.ts';
import { db, type Executor } from '../../db/client.ts';
import { recoveryCode, secondStep } from '../../db/schema.ts';
import { auditedBy, recordAudit } from '../../workshop/audit.ts';
import type { Browser } from '../browser.ts';
import { checkPassword } from '../check-password.ts';
import { renewSession } from '../lucia.ts';

/** Signing in takes no code any more. Other sessions end. */
export async function endSecondStep(
  caller: PersonCaller,
  password: string,
  browser: Browser,
): Promise<Cookie> {
  await checkPassword(caller.personId, password, browser.address);
  await db().transaction(async (tx) => {
    await forgetSecondStep(tx, caller.personId);
    const entry = { ...auditedBy(caller, caller.workshopId, browser.address), subject: '' };
    await recordAudit({ ...entry, action: 'second sign-in step switched off' }, tx);
  });
  return renewSession(caller.personId, browser);
}

export async function forgetSecondStep(tx: Executor, personId: string): Promise<void> {
  await tx.delete(secondStep).where(eq(secondStep.personId, personId));
  await tx.delete(recoveryCode).where(eq(recoveryCode.personId, personId));
}
