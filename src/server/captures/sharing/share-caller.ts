import { eq, sql } from 'drizzle-orm';
import type { ShareCaller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { capture, person, shareLink } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { hashSecret } from '../../ids.ts';

/** The caller whom a link's secret makes: unknown is 404; right but ended, withdrawn or its capture deleted is 410. */
export async function shareCaller(secret: string): Promise<ShareCaller> {
  if (!/^[\w-]{43}$/.test(secret)) throw new ApiError('not_found');
  const [found] = await db()
    .select({
      link: shareLink,
      sharedBy: person.name,
      ended: sql<boolean>`${shareLink.expiresAt} <= now() or ${shareLink.withdrawnAt} is not null
        or ${capture.deletedAt} is not null`,
    })
    .from(shareLink)
    .innerJoin(capture, eq(capture.id, shareLink.captureId))
    .innerJoin(person, eq(person.id, shareLink.createdBy))
    .where(eq(shareLink.secretHash, hashSecret(secret)));
  if (found === undefined) throw new ApiError('not_found');
  if (found.ended) throw new ApiError('link_ended');
  const { link, sharedBy } = found;
  return {
    kind: 'share',
    linkId: link.id,
    captureId: link.captureId,
    mayAnswer: link.mayAnswer,
    question: link.question,
    sharedBy,
    expiresAt: link.expiresAt,
  };
}
