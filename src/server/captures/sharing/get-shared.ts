import { and, asc, eq, isNull, or } from 'drizzle-orm';
import { type SharedCaptureJson, sharedCapture } from '../../../contract/areas/sharing.ts';
import { type MarkRecord, OPENERS, type ShareCaller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { answer, mark, person, shareLink } from '../../db/schema.ts';
import { captureJson } from '../capture-json.ts';
import { captureWheel } from '../capture-wheel.ts';
import { markJson } from '../marks/mark-json.ts';

/**
 * What a link shows. The last step puts everything through the contract's schema, which drops every field that is not listed
 * there: a field added to captures later does not leak by itself.
 */
export async function getShared(caller: ShareCaller): Promise<SharedCaptureJson> {
  const row = await OPENERS.capture(caller, 'shared.get', caller.captureId);
  const [capture, wheel, marks, answers] = await Promise.all([
    captureJson(row),
    captureWheel(row),
    marksOf(caller),
    answersOf(caller),
  ]);
  return sharedCapture.parse({
    capture,
    wheel,
    marks,
    answers,
    sharedBy: caller.sharedBy,
    question: caller.question,
    mayAnswer: caller.mayAnswer,
    expiresAt: caller.expiresAt.toISOString(),
  });
}

/** The workshop's own marks and those of this link's answers; of the workshop's people only who shared it is named. */
async function marksOf(caller: ShareCaller) {
  const rows = await db()
    .select({ row: mark, by: person.name })
    .from(mark)
    .leftJoin(answer, eq(answer.id, mark.answerId))
    .leftJoin(shareLink, and(eq(shareLink.id, caller.linkId), eq(shareLink.createdBy, mark.createdBy)))
    .leftJoin(person, eq(person.id, shareLink.createdBy))
    .where(
      and(
        eq(mark.captureId, caller.captureId),
        isNull(mark.deletedAt),
        or(isNull(mark.answerId), eq(answer.shareLinkId, caller.linkId)),
      ),
    )
    .orderBy(asc(mark.fromS), asc(mark.id));
  return rows.map(({ row, by }) => ({ ...markJson(row), author: authorShown(row, by) }));
}

const authorShown = (row: MarkRecord, sharedBy: string | null): string =>
  row.answerId === null ? (sharedBy ?? 'the workshop') : row.author;

async function answersOf(caller: ShareCaller) {
  const rows = await db()
    .select()
    .from(answer)
    .where(and(eq(answer.shareLinkId, caller.linkId), isNull(answer.hiddenAt)))
    .orderBy(asc(answer.createdAt), asc(answer.id));
  return rows.map((row) => ({ ...row, createdAt: row.createdAt.toISOString() }));
}
