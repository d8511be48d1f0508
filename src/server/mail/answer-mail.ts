import { eq } from 'drizzle-orm';
import { config } from '../config.ts';
import { capture, person, shareLink } from '../db/schema.ts';
import type { Transaction } from '../queue/transaction.ts';
import { queueMail } from './queue-mail.ts';

interface Given {
  readonly linkId: string;
  readonly name: string;
  readonly text: string;
}

/** Tells who made the link that it was answered, unless they have switched that off. */
export async function mailAnswer(transaction: Transaction, { linkId, name, text }: Given): Promise<void> {
  const [found] = await transaction.tx
    .select({
      to: person.email,
      mutedMail: person.mutedMail,
      title: capture.title,
      captureId: capture.id,
      question: shareLink.question,
    })
    .from(shareLink)
    .innerJoin(person, eq(person.id, shareLink.createdBy))
    .innerJoin(capture, eq(capture.id, shareLink.captureId))
    .where(eq(shareLink.id, linkId));
  if (found === undefined || found.mutedMail.includes('answers')) return;
  await queueMail(transaction, {
    kind: 'answer',
    to: found.to,
    subject: `${name} answered about ${found.title}`,
    parts: [
      `${name} looked at "${found.title}" through your link and wrote:`,
      { quote: text },
      ...(found.question === '' ? [] : ['You had asked:', { quote: found.question }]),
      { label: 'Open the capture', link: `${config().origin}/captures/${found.captureId}` },
      { label: 'Which mails come is set here', link: `${config().origin}/workshop/sign-in` },
    ],
  });
}
