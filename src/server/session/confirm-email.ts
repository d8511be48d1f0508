import { eq } from 'drizzle-orm';
import type { Cookie } from 'lucia';
import { mailedLink, person, session } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { limitMailAsked } from '../http/limits.ts';
import { oldAddressMail } from '../mail/email-change-mails.ts';
import { queueMail } from '../mail/queue-mail.ts';
import { inTransaction } from '../queue/transaction.ts';
import { recordAudit } from '../workshop/audit.ts';
import type { Browser } from './browser.ts';
import { personOfCookie, startSession } from './lucia.ts';
import { takeMailedLink } from './take-mailed-link.ts';

/**
 * Takes a confirmed address into use, once. Every session ends; a browser that was signed in as this person gets a new one.
 * Reset links that were mailed to the old address end too.
 */
export async function confirmEmail(secret: string, browser: Browser): Promise<Cookie | null> {
  await limitMailAsked(browser.address);
  const signedIn = await personOfCookie(browser.cookieHeader);
  const personId = await inTransaction(async (transaction) => {
    const { tx } = transaction;
    const link = await takeMailedLink(tx, 'email', secret);
    const email = link.email ?? '';
    const [other] = await tx.select({ id: person.id }).from(person).where(eq(person.email, email));
    const [who] = await tx.select().from(person).where(eq(person.id, link.personId)).for('update');
    if (other !== undefined || who === undefined)
      throw new ApiError('conflict', { message: 'This address has an account by now. Yours keeps its own.' });
    await tx.update(person).set({ email }).where(eq(person.id, who.id));
    await tx.delete(session).where(eq(session.userId, who.id));
    await tx.delete(mailedLink).where(eq(mailedLink.personId, who.id));
    const entry = { workshopId: who.currentWorkshopId, personId: who.id, who: who.name };
    await recordAudit({ ...entry, action: 'address changed', subject: '', address: browser.address }, tx);
    await queueMail(transaction, oldAddressMail(who.name, who.email));
    return who.id;
  });
  return signedIn?.id === personId ? startSession(personId, browser) : null;
}
