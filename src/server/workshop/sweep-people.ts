import { and, eq, inArray, isNotNull, lt, or, sql } from 'drizzle-orm';
import { db } from '../db/client.ts';
import {
  audit,
  invitation,
  mailedLink,
  outgoingMail,
  pendingSignIn,
  session,
  webhookDelivery,
  workshop,
} from '../db/schema.ts';
import { endDueWorkshops } from './end-due-workshops.ts';

const MONTH_AGO = sql`now() - interval '30 days'`;

/**
 * Removes what is over: links, half sign-ins, sessions and invitations past their end, mails and webhook lines of a month ago,
 * lines of the audit list older than the workshop keeps them, and workshops whose time of grace is over.
 */
export async function sweepPeople(): Promise<{ workshopsEnded: number }> {
  const now = sql`now()`;
  await db().delete(mailedLink).where(lt(mailedLink.expiresAt, now));
  await db().delete(pendingSignIn).where(lt(pendingSignIn.expiresAt, now));
  await db().delete(session).where(lt(session.expiresAt, now));
  await db().delete(invitation).where(lt(invitation.expiresAt, MONTH_AGO));
  await db()
    .delete(outgoingMail)
    .where(
      and(
        lt(outgoingMail.createdAt, MONTH_AGO),
        or(isNotNull(outgoingMail.sentAt), isNotNull(outgoingMail.givenUpAt)),
      ),
    );
  await db().delete(webhookDelivery).where(lt(webhookDelivery.createdAt, MONTH_AGO));
  const old = db()
    .select({ id: audit.id })
    .from(audit)
    .innerJoin(workshop, eq(workshop.id, audit.workshopId))
    .where(lt(audit.at, sql`now() - make_interval(days => ${workshop.auditDays})`))
    .limit(10_000);
  await db().delete(audit).where(inArray(audit.id, old));
  return { workshopsEnded: await endDueWorkshops() };
}
