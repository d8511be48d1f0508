import { eq } from 'drizzle-orm';
import { config } from '../config.ts';
import { person } from '../db/schema.ts';
import type { Transaction } from '../queue/transaction.ts';
import { queueMail } from './queue-mail.ts';

interface HandOver {
  readonly jobId: string;
  /** "J-0007". */
  readonly job: string;
  readonly complaint: string;
  readonly to: string;
  readonly by: { readonly personId: string; readonly name: string };
}

/** Tells whom a job was handed to, unless they took it themselves or have switched such mails off. */
export async function mailHandOver(transaction: Transaction, given: HandOver): Promise<void> {
  const { jobId, job, complaint, to, by } = given;
  if (to === by.personId) return;
  const [found] = await transaction.tx
    .select({ email: person.email, mutedMail: person.mutedMail })
    .from(person)
    .where(eq(person.id, to));
  if (found === undefined || found.mutedMail.includes('mentions')) return;
  await queueMail(transaction, {
    kind: 'hand-over',
    to: found.email,
    subject: `${by.name} hands ${job} to you`,
    parts: [
      `${by.name} hands ${job} to you. The complaint:`,
      { quote: complaint },
      { label: 'Open the job', link: `${config().origin}/jobs/${jobId}` },
      { label: 'Which mails come is set here', link: `${config().origin}/workshop/sign-in` },
    ],
  });
}
