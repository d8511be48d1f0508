import { eq, sql } from 'drizzle-orm';
import { z } from 'zod';
import { config } from '../config.ts';
import { db } from '../db/client.ts';
import { outgoingMail } from '../db/schema.ts';
import { log } from '../log.ts';
import { mailJob } from '../queue/names.ts';
import { completeJob, ownJob } from '../queue/own-job.ts';
import type { TakenJob } from '../queue/take-job.ts';
import { inTransaction } from '../queue/transaction.ts';
import { unseal } from '../seal.ts';
import type { SealedMail } from './queue-mail.ts';
import { transport } from './transport.ts';

/** The mail server is away, or asks to come again later: the mail stays and is tried again. */
export class MailAway extends Error {
  override readonly name = 'MailAway';
}

const sealedMail: z.ZodType<SealedMail> = z.object({
  to: z.string(),
  subject: z.string(),
  text: z.string(),
  html: z.string(),
  pictures: z.array(z.object({ id: z.string(), base64: z.string() })),
});

/**
 * Sends one mail and notes it in the transaction that ends the job. Its Message-ID is the row's, so that a mail sent again
 * after a worker died in between is known as the same by mail programs.
 */
export async function deliverMail(job: TakenJob): Promise<void> {
  const { mailId } = mailJob.parse(job.data);
  const [row] = await db().select().from(outgoingMail).where(eq(outgoingMail.id, mailId));
  if (row === undefined || row.sealed === null) return end(job, mailId, null);
  if (row.notAfter.getTime() <= Date.now()) return end(job, mailId, 'givenUpAt');
  const mail = sealedMail.parse(JSON.parse(unseal('mail', row.sealed)));
  try {
    await transport().sendMail({
      from: config().mail.from,
      messageId: `<${row.id}@${new URL(config().origin).hostname}>`,
      to: mail.to,
      subject: mail.subject,
      text: mail.text,
      html: mail.html,
      attachments: mail.pictures.map(({ id, base64 }) => ({
        cid: id,
        filename: `${id}.png`,
        content: Buffer.from(base64, 'base64'),
        contentType: 'image/png',
        contentDisposition: 'inline' as const,
      })),
    });
  } catch (error) {
    if (!refusedForGood(error)) throw new MailAway('The mail server did not take the mail', { cause: error });
    log.warn({ mail: row.id, kind: row.kind, code: responseCode(error) }, 'a mail was refused for good');
    return end(job, mailId, 'givenUpAt');
  }
  await end(job, mailId, 'sentAt');
}

const responseCode = (error: unknown): number | null =>
  error instanceof Error && 'responseCode' in error && typeof error.responseCode === 'number'
    ? error.responseCode
    : null;

/** Replies of 5yz are final, all others may change (RFC 5321, 4.2.1); a failed sign-in to the mail server is ours to mend. */
function refusedForGood(error: unknown): boolean {
  const code = responseCode(error);
  const ours = error instanceof Error && 'code' in error && error.code === 'EAUTH';
  return !ours && code !== null && code >= 500 && code < 600;
}

async function end(job: TakenJob, mailId: string, how: 'sentAt' | 'givenUpAt' | null): Promise<void> {
  await inTransaction(async ({ tx, queueDb }) => {
    await ownJob(queueDb, job);
    if (how !== null)
      await tx
        .update(outgoingMail)
        .set({ sealed: null, [how]: sql`now()` })
        .where(eq(outgoingMail.id, mailId));
    await completeJob(queueDb, job);
  });
}
