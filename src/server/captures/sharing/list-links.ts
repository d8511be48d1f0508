import { and, count, desc, eq, getTableColumns, isNull } from 'drizzle-orm';
import type { ShareLinkJson } from '../../../contract/areas/sharing.ts';
import { db } from '../../db/client.ts';
import { answer, person, shareLink } from '../../db/schema.ts';

/** The links of a capture, newest first, without their secrets. */
export async function listLinks(captureId: string): Promise<ShareLinkJson[]> {
  const rows = await db()
    .select({ link: getTableColumns(shareLink), createdBy: person.name, answers: count(answer.id) })
    .from(shareLink)
    .innerJoin(person, eq(person.id, shareLink.createdBy))
    .leftJoin(answer, and(eq(answer.shareLinkId, shareLink.id), isNull(answer.hiddenAt)))
    .where(eq(shareLink.captureId, captureId))
    .groupBy(shareLink.id, person.name)
    .orderBy(desc(shareLink.createdAt), desc(shareLink.id))
    .limit(500);
  return rows.map(({ link, createdBy, answers }) => ({
    id: link.id,
    question: link.question,
    mayAnswer: link.mayAnswer,
    createdAt: link.createdAt.toISOString(),
    expiresAt: link.expiresAt.toISOString(),
    withdrawnAt: link.withdrawnAt?.toISOString() ?? null,
    seen: link.seen,
    answers,
    createdBy,
  }));
}
