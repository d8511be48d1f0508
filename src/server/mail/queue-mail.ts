import { config } from '../config.ts';
import { outgoingMail } from '../db/schema.ts';
import { newId } from '../ids.ts';
import { QUEUES } from '../queue/names.ts';
import type { Transaction } from '../queue/transaction.ts';
import { seal } from '../seal.ts';
import { type Letter, letter, type Part } from './letter.ts';

export interface Mail {
  /** What it is about, for the log: never who. */
  readonly kind: string;
  readonly to: string;
  readonly subject: string;
  readonly parts: readonly Part[];
  /** After this the mail is of no use and is not sent any more; a week unless said. */
  readonly notAfter?: Date;
  readonly pictures?: readonly { readonly id: string; readonly png: Buffer }[];
}

export interface SealedMail extends Letter {
  readonly to: string;
  readonly subject: string;
  readonly pictures: readonly { readonly id: string; readonly base64: string }[];
}

const KEPT_MS = 7 * 86_400_000;

/** One line, as a header must be. */
const oneLine = (text: string) => text.replace(/\s+/g, ' ').trim().slice(0, 150);

/** Whether this server can send mail at all. */
export const mailWorks = (): boolean => config().mail.url !== undefined;

/**
 * Puts a mail on its way in the transaction of what caused it: rolled back with it, kept while the mail server is away, sent
 * once. Without a mail server nothing is kept.
 */
export async function queueMail({ tx, send }: Pick<Transaction, 'tx' | 'send'>, mail: Mail): Promise<void> {
  if (!mailWorks()) return;
  const id = newId();
  const sealed: SealedMail = {
    to: mail.to,
    subject: oneLine(mail.subject),
    ...letter(mail.parts),
    pictures: (mail.pictures ?? []).map(({ id: name, png }) => ({
      id: name,
      base64: png.toString('base64'),
    })),
  };
  await tx.insert(outgoingMail).values({
    id,
    kind: mail.kind,
    sealed: seal('mail', JSON.stringify(sealed)),
    notAfter: mail.notAfter ?? new Date(Date.now() + KEPT_MS),
  });
  await send(QUEUES.mail, { mailId: id });
}
