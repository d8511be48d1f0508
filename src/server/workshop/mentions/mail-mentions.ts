import { and, eq, ne } from 'drizzle-orm';
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
      title: capture.title,
    })
    .from(capture)
    .innerJoin(membership, eq(membership.workshopId, capture.workshopId))
    .innerJoin(person, eq(person.id, membership.personId))
    .where(
      and(eq(capture.id, captureId), ne(person.id, by.personId), captureVisible(person.id, membership.role)),
    );
  const told = new Set(mentionedIn(before, people));
  const named = new Set(mentionedIn(text, people).filter((id) => !told.has(id)));
  for (const one of people.filter(({ id, mutedMail }) => named.has(id) && !mutedMail.includes('mentions')))
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
