import { limitMailAsked } from '../http/limits.ts';
import { queueMail } from '../mail/queue-mail.ts';
import { signInChangedMail } from '../mail/sign-in-changed-mail.ts';
import { inTransaction } from '../queue/transaction.ts';
import { recordAudit } from '../workshop/audit.ts';
import { hashPassword } from './password.ts';
import { setPassword } from './set-password.ts';
import { takeMailedLink } from './take-mailed-link.ts';

/** Sets a new password with the secret of a mailed link, once. Who is signed in anywhere signs in again. */
export async function resetPassword(given: {
  secret: string;
  password: string;
  address: string;
}): Promise<void> {
  await limitMailAsked(given.address);
  const passwordHash = await hashPassword(given.password);
  await inTransaction(async (transaction) => {
    const { tx } = transaction;
    const { personId } = await takeMailedLink(tx, 'password', given.secret);
    const who = await setPassword(tx, personId, passwordHash);
    if (who === undefined) return;
    await recordAudit(
      {
        workshopId: who.workshopId,
        personId,
        who: who.name,
        action: 'password set by mail',
        subject: '',
        address: given.address,
      },
      tx,
    );
    await queueMail(transaction, signInChangedMail(who, 'a new password was set'));
  });
}
