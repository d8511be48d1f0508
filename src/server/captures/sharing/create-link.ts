import { and, count, eq, gt, isNull, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { shareLinkInput } from '../../../contract/areas/sharing.ts';
import type { CaptureRecord, PersonCaller } from '../../access.ts';
import { config } from '../../config.ts';
import { capture, shareLink } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { limitQuestions } from '../../http/limits.ts';
import { hashSecret, newId, newSecret } from '../../ids.ts';
import { log } from '../../log.ts';
import { questionMail } from '../../mail/question-mail.ts';
import { mailWorks, queueMail } from '../../mail/queue-mail.ts';
import { inTransaction } from '../../queue/transaction.ts';
import { auditedBy, recordAudit } from '../../workshop/audit.ts';
import { capturePicture } from '../picture/capture-picture.ts';

const DAY_MS = 86_400_000;
const DEFAULT_DAYS = 14;
const LONGEST_DAYS = 366;
/** Links of one capture that are open at the same time. */
const OPEN_LINKS = 100;

/** The end of a link: 14 days from now unless said, at most a year. */
export function linkEnd(expiresAt: string | undefined, now = Date.now()): Date {
  const end = expiresAt === undefined ? now + DEFAULT_DAYS * DAY_MS : Date.parse(expiresAt);
  if (end <= now || end > now + LONGEST_DAYS * DAY_MS) {
    throw new ApiError('invalid', {
      details: [{ path: 'expiresAt', message: 'lies in the future, at most a year from now' }],
    });
  }
  return new Date(end);
}

/** Makes a link that opens one capture. Its address holds the secret, and is in this answer and nowhere else. */
export async function createLink(
  caller: PersonCaller,
  row: CaptureRecord,
  input: z.output<typeof shareLinkInput>,
  address: string,
): Promise<{ id: string; url: string }> {
  const expiresAt = linkEnd(input.expiresAt);
  const id = newId();
  const secret = newSecret();
  const url = `${config().origin}/s/${secret}`;
  const { email } = input;
  if (email !== undefined) await checkMail(caller);
  const picture = email === undefined ? null : await pictureOf(row);
  await inTransaction(async (transaction) => {
    const { tx } = transaction;
    await tx.select({ id: capture.id }).from(capture).where(eq(capture.id, row.id)).for('update');
    const [open] = await tx
      .select({ total: count() })
      .from(shareLink)
      .where(
        and(
          eq(shareLink.captureId, row.id),
          isNull(shareLink.withdrawnAt),
          gt(shareLink.expiresAt, sql`now()`),
        ),
      );
    if ((open?.total ?? 0) >= OPEN_LINKS) {
      throw new ApiError('conflict', {
        message: `This capture has ${OPEN_LINKS} open links.`,
        hint: 'Withdraw some that are no longer needed.',
      });
    }
    await tx.insert(shareLink).values({
      id,
      captureId: row.id,
      createdBy: caller.personId,
      secretHash: hashSecret(secret),
      question: input.question ?? '',
      mayAnswer: input.mayAnswer,
      expiresAt,
    });
    await recordAudit(
      {
        ...auditedBy(caller, row.workshopId, address),
        action: email === undefined ? 'link made' : 'question mailed',
        subject: row.title,
      },
      tx,
    );
    if (email === undefined) return;
    const question = {
      to: email,
      from: caller.name,
      title: row.title,
      question: input.question ?? '',
      url,
      expiresAt,
      picture,
    };
    await queueMail(transaction, questionMail({ ...question, mayAnswer: input.mayAnswer }));
  });
  return { id, url };
}

/** Mails to strangers in our name are limited, and promised only where they can be sent. */
async function checkMail(caller: PersonCaller): Promise<void> {
  if (!mailWorks())
    throw new ApiError('conflict', {
      message: 'This server sends no mail. Make the link without an address and send it yourself.',
    });
  await limitQuestions(caller.personId);
}

/** The trace as the link shows it. A question goes without one when there is nothing to draw, or it cannot be had now. */
async function pictureOf(row: CaptureRecord): Promise<Buffer | null> {
  try {
    return (await capturePicture(row, { width: 640, theme: 'paper', format: 'png', shared: true })).body;
  } catch (error) {
    const code = error instanceof ApiError ? error.code : 'fault';
    log.info({ capture: row.id, code }, 'a question goes without a picture');
    return null;
  }
}
