import type { Cookie } from 'lucia';
import type { PersonCaller } from '../access.ts';
import { queueMail } from '../mail/queue-mail.ts';
import { signInChangedMail } from '../mail/sign-in-changed-mail.ts';
import { inTransaction } from '../queue/transaction.ts';
import { auditedBy, recordAudit } from '../workshop/audit.ts';
import type { Browser } from './browser.ts';
import { checkPassword } from './check-password.ts';
import { startSession } from './lucia.ts';
import { hashPassword } from './password.ts';
import { setPassword } from './set-password.ts';

/** Changes one's own password. The other sessions end; this browser gets a new one. */
export async function changePassword(
  caller: PersonCaller,
  given: { readonly current: string; readonly password: string },
  browser: Browser,
): Promise<Cookie> {
  await checkPassword(caller.personId, given.current, browser.address);
  const passwordHash = await hashPassword(given.password);
  await inTransaction(async (transaction) => {
    const who = await setPassword(transaction.tx, caller.personId, passwordHash);
    const entry = { ...auditedBy(caller, caller.workshopId, browser.address), subject: '' };
    await recordAudit({ ...entry, action: 'password changed' }, transaction.tx);
    if (who !== undefined) await queueMail(transaction, signInChangedMail(who, 'the password was changed'));
  });
  return startSession(caller.personId, browser);
}
