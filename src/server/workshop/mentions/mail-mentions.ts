import { and, eq, isNull, ne } from 'drizzle-orm';
import type { Role } from '../../../contract/roles.ts';
import { captureVisible } from '../../access.ts';
import { config } from '../../config.ts';
import { capture, membership, person } from '../../db/schema.ts';
import { queueMail } from '../../mail/queue-mail.ts';
import type { Transaction } from '../../queue/transaction.ts';
import { mentionedIn } from './mentioned-in.ts';

interface Mention {
  readonly captureId: string;
  /** Who wrote it: nobody is told of what they wrote themselves. */
  readonly by: { readonly personId: string; readonly name: string };
  readonly text: string;
  /** What it said before: who was named then has been told. */
  readonly before?: string;
}

/** Mails those whom a mark names with an at sign, if they belong to the workshop, see the capture and want such mails. */
export async function mailMentions(transaction: Transaction, mention: Mention): Promise<void> {
  const { captureId, by, text, before = '' } = mention;
  if (!text.includes('@')) return;
  const people = await transaction.tx
    .select({
      id: person.id,
      name: person.name,
      email: person.email,
      mutedMail: person.mutedMail,
      role: membership.role,
      title: capture.title,
    })
    .from(capture)
    .innerJoin(membership, eq(membership.workshopId, capture.workshopId))
    .innerJoin(person, eq(person.id, membership.personId))
    .where(and(eq(capture.id, captureId), ne(person.id, by.personId)));
  const told = new Set(mentionedIn(before, people));
  const named = new Set(mentionedIn(text, people).filter((id) => !told.has(id)));
  for (const one of people.filter(({ id, mutedMail }) => named.has(id) && !mutedMail.includes('mentions'))) {
    if (!(await sees(transaction, captureId, one))) continue;
    await queueMail(transaction, {
      kind: 'mention',
      to: one.email,
      subject: `${by.name} names you on ${one.title}`,
      parts: [
        `${by.name} wrote in a mark on "${one.title}":`,
        { quote: text },
        { label: 'Open the capture', link: `${config().origin}/captures/${captureId}` },
        { label: 'Which mails come is set here', link: `${config().origin}/workshop/sign-in` },
      ],
    });
  }
}

async function sees(
  { tx }: Transaction,
  captureId: string,
  { id, role }: { readonly id: string; readonly role: Role },
): Promise<boolean> {
  const seen = and(eq(capture.id, captureId), isNull(capture.deletedAt), captureVisible(id, role));
  return (await tx.select({ id: capture.id }).from(capture).where(seen)).length > 0;
}
