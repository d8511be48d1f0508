import { and, asc, eq, getTableColumns, isNull } from 'drizzle-orm';
import type { AnswerJson } from '../../../contract/areas/sharing.ts';
import { db } from '../../db/client.ts';
import { answer, mark } from '../../db/schema.ts';
import { markJson } from '../marks/mark-json.ts';

const LONGEST = 1_000;

/** Answers of a capture that were not hidden, in order of time, with the mark that came with each. */
export async function listAnswers(captureId: string): Promise<AnswerJson[]> {
  const rows = await db()
    .select({ row: getTableColumns(answer), mark: getTableColumns(mark) })
    .from(answer)
    .leftJoin(mark, and(eq(mark.answerId, answer.id), isNull(mark.deletedAt)))
    .where(and(eq(answer.captureId, captureId), isNull(answer.hiddenAt)))
    .orderBy(asc(answer.createdAt), asc(answer.id))
    .limit(LONGEST);
  return rows.map(({ row, mark: its }) => ({
    id: row.id,
    shareLinkId: row.shareLinkId,
    name: row.name,
    text: row.text,
    createdAt: row.createdAt.toISOString(),
    mark: its === null ? null : markJson(its),
  }));
}
