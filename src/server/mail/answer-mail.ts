import { eq } from 'drizzle-orm';
import { config } from '../config.ts';
import { db } from '../db/client.ts';
import { capture, person, shareLink } from '../db/schema.ts';
import { sendMail } from './send-mail.ts';

interface Given {
  readonly linkId: string;
  readonly name: string;
  readonly text: string;
}

/** Tells who made the link that it was answered. */
export async function mailAnswer({ linkId, name, text }: Given): Promise<void> {
  const [found] = await db()
    .select({ to: person.email, title: capture.title, captureId: capture.id, question: shareLink.question })
    .from(shareLink)
    .innerJoin(person, eq(person.id, shareLink.createdBy))
    .innerJoin(capture, eq(capture.id, shareLink.captureId))
    .where(eq(shareLink.id, linkId));
  if (found === undefined) return;
  const asked = found.question === '' ? [] : [`You asked: ${found.question}`, ''];
  await sendMail({
    to: found.to,
    subject: `${name} answered about ${found.title}`,
    text: [
      `${name} looked at "${found.title}" through your link and wrote:`,
      '',
      text,
      '',
      ...asked,
      `${config().origin}/captures/${found.captureId}`,
      '',
    ].join('\n'),
  });
}
