import { and, desc, eq } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import type { AttemptOfJson } from '../../../contract/areas/teaching.ts';
import { db } from '../../db/client.ts';
import { attempt, person } from '../../db/schema.ts';
import { decodeTimeCursor, page } from '../../http/cursor.ts';
import { olderThan, timeKey } from '../../http/keyset.ts';
import { attemptJson } from './attempt-json.ts';

const judge = alias(person, 'judge');

const select = () =>
  db()
    .select({ row: attempt, who: person.name, judge: judge.name, key: timeKey(attempt.createdAt) })
    .from(attempt)
    .innerJoin(person, eq(person.id, attempt.personId))
    .leftJoin(judge, eq(judge.id, attempt.judgedBy));

type Selected = Awaited<ReturnType<typeof select>>[number];
const json = ({ row, who, judge: judged }: Selected): AttemptOfJson => ({
  ...attemptJson(row, judged),
  person: { id: row.personId, name: who },
});

/** What was answered on an exercise, newest first. */
export async function listAttempts(
  exerciseId: string,
  query: { readonly limit: number; readonly cursor?: string | undefined },
) {
  const after = decodeTimeCursor(query.cursor);
  const rows = await select()
    .where(and(eq(attempt.exerciseId, exerciseId), olderThan(attempt.createdAt, attempt.id, after)))
    .orderBy(desc(attempt.createdAt), desc(attempt.id))
    .limit(query.limit + 1);
  const { items, nextCursor } = page(rows, query.limit, ({ key, row }) => ({ key, id: row.id }));
  return { items: items.map(json), nextCursor };
}

/** One attempt with its person. */
export async function attemptOfJson(id: string): Promise<AttemptOfJson> {
  const [found] = await select().where(eq(attempt.id, id));
  return json(found!);
}
